import type { LiveState } from '../../domain/sked/live';

interface Props {
  strip: LiveState['strip'];
  own: string;
  nowMs: number;
}

/** "21:24", with seconds where the period does not begin on a minute. */
export function periodClock(timeMs: number): string {
  return new Date(timeMs).toISOString().slice(11, timeMs % 60_000 === 0 ? 16 : 19);
}

/** The periods around now: own ones filled, the hand where we are. */
export function PeriodStrip({ strip, own, nowMs }: Props) {
  return (
    <ol className="turns">
      {strip.map((period) => {
        const current = nowMs >= period.startMs && nowMs < period.endMs;
        const share = current ? (nowMs - period.startMs) / (period.endMs - period.startMs) : 0;
        const mine = period.callSign === own;
        return (
          <li
            key={period.startMs}
            className={[
              'turns__one',
              mine ? 'turns__one--own' : '',
              current ? 'turns__one--now' : '',
            ].join(' ')}
            aria-current={current ? 'time' : undefined}
          >
            <svg
              className="turns__bar"
              viewBox="0 0 100 26"
              preserveAspectRatio="none"
              aria-hidden="true"
            >
              {current && mine ? (
                <rect className="turns__gone" width={share * 100} height="26" />
              ) : null}
              {current ? (
                <line
                  className="turns__hand"
                  x1={share * 100}
                  x2={share * 100}
                  y1="0"
                  y2="26"
                  vectorEffect="non-scaling-stroke"
                />
              ) : null}
            </svg>
            <span className="turns__time">{periodClock(period.startMs)}</span>
            <span className="turns__who">{mine ? 'you' : period.callSign}</span>
          </li>
        );
      })}
    </ol>
  );
}
