import { stationHoursSchema } from '../../domain/station/hoursSchema';
import { formatClock, formatDay, formatDuration, zoneName } from '../../domain/time/format';
import { DAY_MS, HOUR_MS, intersectIntervals, type Interval } from '../../domain/time/interval';
import { expandUsableHours, type WeeklyHours } from '../../domain/time/weeklyHours';

interface Props {
  hours: WeeklyHours;
  nowMs: number;
}

const LEFT = 74;
const WIDTH = 440;
const ROW = 24;

/** What the hours are in UTC on the next seven days, drawn and in words. */
export function WeekResult({ hours, nowMs }: Props) {
  const { timeZone, weekly, daysOff } = hours;
  const complete = stationHoursSchema.safeParse({ weekly, daysOff }).success;
  const startMs = Math.floor(nowMs / DAY_MS) * DAY_MS;
  const days = Array.from({ length: 7 }, (_, index) => ({
    startMs: startMs + index * DAY_MS,
    endMs: startMs + (index + 1) * DAY_MS,
  }));
  if (!complete) {
    return <p className="quiet">The next seven days appear when every time is complete.</p>;
  }
  const usable = expandUsableHours(hours, { startMs, endMs: startMs + 7 * DAY_MS });
  const totalMs = usable.reduce((sum, one) => sum + one.endMs - one.startMs, 0);
  return (
    <section className="stack" aria-labelledby="week-result">
      <h2 id="week-result">The next seven days in UTC</h2>
      <p className="quiet">
        {formatDuration(totalMs)} usable. Local is {zoneName(nowMs, timeZone)} now.
      </p>
      <WeekPicture days={days} usable={usable} />
      <table className="table">
        <thead>
          <tr>
            <th scope="col">Day, UTC</th>
            <th scope="col">Usable, UTC</th>
          </tr>
        </thead>
        <tbody>
          {days.map((day) => (
            <tr key={day.startMs}>
              <th scope="row" className="whitespace-nowrap">
                {formatDay(day.startMs)}
              </th>
              <td>{inWords(intersectIntervals(usable, [day]), day)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  );
}

function inWords(parts: Interval[], day: Interval): string {
  if (parts.length === 0) return 'not usable';
  return parts
    .map(({ startMs, endMs }) =>
      startMs === day.startMs && endMs === day.endMs
        ? 'all day'
        : `${formatClock(startMs)}–${endMs === day.endMs ? '24:00' : formatClock(endMs)}`,
    )
    .join(', ');
}

function WeekPicture({ days, usable }: { days: Interval[]; usable: Interval[] }) {
  const x = (ms: number) => LEFT + ((WIDTH - LEFT) * ms) / DAY_MS;
  const height = 20 + days.length * ROW;
  return (
    <svg className="chart" viewBox={`0 0 ${WIDTH} ${height}`} aria-hidden="true">
      {days.map((day, row) => (
        <g key={day.startMs} transform={`translate(0 ${20 + row * ROW})`}>
          <text x={0} y={14}>
            {formatDay(day.startMs)}
          </text>
          <rect className="week__ground" x={LEFT} y={3} width={WIDTH - LEFT} height={ROW - 6} />
          {intersectIntervals(usable, [day]).map((part) => (
            <rect
              key={part.startMs}
              className="week__usable"
              x={x(part.startMs - day.startMs)}
              y={3}
              width={x(part.endMs - day.startMs) - x(part.startMs - day.startMs)}
              height={ROW - 6}
            />
          ))}
        </g>
      ))}
      {[0, 6, 12, 18, 24].map((hour) => (
        <g key={hour}>
          <path className="week__hour" d={`M${x(hour * HOUR_MS)} 18V${height}`} />
          <text
            x={x(hour * HOUR_MS)}
            y={12}
            textAnchor={hour === 24 ? 'end' : hour === 0 ? 'start' : 'middle'}
          >
            {String(hour).padStart(2, '0')}
          </text>
        </g>
      ))}
    </svg>
  );
}
