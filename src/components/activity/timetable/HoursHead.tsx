import { formatDay } from '../../../domain/time/format';
import { DAY_MS, HOUR_MS, type Interval } from '../../../domain/time/interval';
import { hourLines, widthOf, xOf, type Span } from './geometry';

interface Props {
  span: Span;
  /** The slot that is held, and its time in words. */
  flag: (Interval & { text: string }) | null;
}

/** Days and UTC hours over the rows, with the flag of the slot that is held. */
export function HoursHead({ span, flag }: Props) {
  const hours = hourLines(span);
  const days = [span.startMs, ...hours.filter(({ line }) => line === 'day').map((one) => one.atMs)];
  const starts = [...new Set(days)].filter((atMs) => {
    const next = days.find((other) => other > atMs) ?? span.endMs;
    return next - atMs >= 4 * HOUR_MS;
  });
  return (
    <div className="tt-hours" style={{ width: widthOf(span) }} aria-hidden="true">
      {starts.map((atMs) => (
        <span key={atMs} className="tt-day" style={{ left: xOf(span, atMs) + 6 }}>
          {formatDay(atMs)}
        </span>
      ))}
      {hours
        .filter(({ line }) => line !== 'hour')
        .map(({ atMs, x, line }) => (
          <span
            key={atMs}
            className={line === 'day' ? 'tt-hour tt-hour--day' : 'tt-hour'}
            style={{ left: x + 6 }}
          >
            {String((atMs % DAY_MS) / HOUR_MS).padStart(2, '0')}
          </span>
        ))}
      {flag ? (
        <span className="tt-flag" style={{ left: Math.max(0, xOf(span, flag.startMs) - 60) }}>
          {flag.text}
        </span>
      ) : null}
    </div>
  );
}
