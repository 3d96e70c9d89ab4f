import type { LiveState } from '../../domain/sked/live';
import { periodWords } from '../../domain/sked/sheetWords';
import { PeriodStrip, periodClock } from './PeriodStrip';

interface Props {
  state: LiveState;
  own: string;
  periodMs: number;
  nowMs: number;
  /** Where the sked is reported; null where it was never agreed. */
  reportHref: string | null;
}

/** Whose turn it is, how long still, and what comes then. */
export function LiveTurn({ state, own, periodMs, nowMs, reportHref }: Props) {
  const { phase, period, next, strip } = state;
  if (phase === 'over') {
    return (
      <section className="live__turn" aria-label="Now">
        <p className="live__who">The sked is over</p>
        <p className="text-action">
          Power off, dish parked, receiver on.{' '}
          {reportHref === null ? null : (
            <a href={reportHref}>
              <strong>How did it go?</strong>
            </a>
          )}
        </p>
      </section>
    );
  }
  const mine = period?.callSign === own;
  const secondsLeft = period ? Math.ceil((period.endMs - nowMs) / 1000) : null;
  const spanOf = ({ startMs, endMs }: { startMs: number; endMs: number }) =>
    `${periodClock(startMs)}–${periodClock(endMs)}`;
  const turnOf = (one: NonNullable<typeof next>) =>
    one.callSign === own
      ? `you transmit ${spanOf(one)}`
      : `${one.callSign} transmits ${spanOf(one)}, you listen`;
  return (
    <section className="live__turn" aria-label="Now">
      <div className="live__turnhead">
        <div>
          <p className={mine ? 'live__who live__who--transmit' : 'live__who'} role="status">
            {period ? (mine ? 'You transmit' : `${period.callSign} transmits`) : 'Not begun yet'}
          </p>
          <p className="live__quiet">
            {period
              ? `${mine ? 'until' : 'you listen, until'} ${periodClock(period.endMs)}`
              : `Periods of ${periodWords(periodMs)}`}
          </p>
        </div>
        {secondsLeft === null ? null : (
          <p className="live__seconds">
            <span className="live__figure">{secondsLeft}</span>{' '}
            <span className="live__quiet">s left</span>
          </p>
        )}
      </div>
      <PeriodStrip strip={strip} own={own} nowMs={nowMs} />
      <p className="live__quiet">
        {next
          ? `${phase === 'before' ? 'First' : 'Then'} ${turnOf(next)}.`
          : 'This is the last period.'}
      </p>
    </section>
  );
}
