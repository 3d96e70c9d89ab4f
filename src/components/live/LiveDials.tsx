import { dialAt, type LiveData, type LivePartner } from '../../domain/sked/live';
import { formatDial } from '../../domain/sked/dial';
import { formatDoppler } from '../../domain/time/format';
import { MINUTE_MS } from '../../domain/time/interval';

interface Props {
  data: LiveData;
  partner: LivePartner;
  conventionLabel: string;
  /** Now, or the start while the sked has not come near. */
  atMs: number;
  /** Null outside the slot. */
  turn: 'transmit' | 'listen' | null;
}

/** What the dials say now and how they go on. */
export function LiveDials({ data, partner, conventionLabel, atMs, turn }: Props) {
  const now = dialAt(data, partner, atMs);
  const later = dialAt(data, partner, atMs + 5 * MINUTE_MS);
  if (!now) return null;
  const { frequencyMhz } = data;
  const change = (laterHz: number, nowHz: number) => formatDoppler(laterHz - nowHz, frequencyMhz);
  const look = (ofTurn: Props['turn']) =>
    turn === null || turn === ofTurn ? 'live__dial live__dial--now' : 'live__dial';
  return (
    <section aria-label="Dials">
      <dl className="live__dials">
        <div>
          <dt>Dial, transmit</dt>
          <dd className={look('transmit')}>{formatDial(frequencyMhz, now.transmitHz)}</dd>
        </div>
        <div>
          <dt>Dial, listen</dt>
          <dd className={look('listen')}>{formatDial(frequencyMhz, now.receiveHz)}</dd>
        </div>
      </dl>
      <p className="live__quiet">
        kHz; {conventionLabel.charAt(0).toLowerCase() + conventionLabel.slice(1)},{' '}
        {formatDial(frequencyMhz, 0)}.
        {later
          ? ` In 5 min: transmit ${change(later.transmitHz, now.transmitHz)}, listen ${change(later.receiveHz, now.receiveHz)}.`
          : null}
      </p>
    </section>
  );
}
