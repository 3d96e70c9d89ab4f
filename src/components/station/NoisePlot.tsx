import type { NoiseRecord } from '../../domain/station/noiseRecord';
import { formatNumber } from '../../domain/time/format';
import { useWidth } from '../window/useWidth';
import { recordDay } from './noiseWords';

const USUAL_WIDTH = 720;
const HEIGHT = 200;
const LEFT = 44;
const RIGHT = 16;
const TOP = 14;
const BOTTOM = 30;

/** System temperature over time; the table beside it says the same. From two records of different days on. */
export function NoisePlot({ records }: { records: NoiseRecord[] }) {
  const [attach, known] = useWidth<HTMLDivElement>();
  const width = known || USUAL_WIDTH;
  const points = records
    .map((record) => ({
      record,
      dayMs: Date.parse(`${record.measuredOn}T00:00Z`),
      kelvin: record.figures.systemTemperatureK,
    }))
    .reverse();
  const [first, last] = [points[0], points.at(-1)];
  if (!first || !last || first.dayMs === last.dayMs) return null;
  const ticks = ticksTo(Math.max(...points.map(({ kelvin }) => kelvin)));
  const top = ticks.at(-1)!;
  const x = (dayMs: number) =>
    LEFT + ((dayMs - first.dayMs) / (last.dayMs - first.dayMs)) * (width - LEFT - RIGHT);
  const y = (kelvin: number) => HEIGHT - BOTTOM - (kelvin / top) * (HEIGHT - TOP - BOTTOM);
  return (
    <div ref={attach} className="min-w-0">
      <svg
        viewBox={`0 0 ${width} ${HEIGHT}`}
        width={width}
        height={HEIGHT}
        className="noise block h-auto max-w-full"
        role="img"
        aria-label={`System temperature over time: ${formatNumber(first.kelvin, 1)} K on ${recordDay(first.record.measuredOn)}, ${formatNumber(last.kelvin, 1)} K on ${recordDay(last.record.measuredOn)}. The table has every record.`}
      >
        {ticks.map((tick) => (
          <g key={tick}>
            <path
              className={tick === 0 ? 'noise__base' : 'noise__rule'}
              d={`M${LEFT} ${Math.round(y(tick)) + 0.5}H${width - RIGHT}`}
            />
            <text className="noise__label" textAnchor="end" x={LEFT - 8} y={y(tick) + 4}>
              {tick}
              {tick === top ? ' K' : ''}
            </text>
          </g>
        ))}
        <path
          className="noise__line"
          d={`M${points.map(({ dayMs, kelvin }) => `${x(dayMs).toFixed(1)} ${y(kelvin).toFixed(1)}`).join('L')}`}
        />
        {points.map(({ record, dayMs, kelvin }) => (
          <circle
            key={record.id}
            className={
              record.measurement.method === 'sun'
                ? 'noise__point noise__point--sun'
                : 'noise__point'
            }
            cx={x(dayMs)}
            cy={y(kelvin)}
            r={4}
          />
        ))}
        <text className="noise__label" x={LEFT} y={HEIGHT - 8}>
          {recordDay(first.record.measuredOn)}
        </text>
        <text className="noise__label" textAnchor="end" x={width - RIGHT} y={HEIGHT - 8}>
          {recordDay(last.record.measuredOn)}
        </text>
      </svg>
      <p className="label">System temperature, K. Dots: hot load and cold sky. Rings: the Sun.</p>
    </div>
  );
}

/** Round numbers from 0 to a little over the most. */
function ticksTo(most: number): number[] {
  const rough = most / 3;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = [1, 2, 5, 10].map((times) => times * power).find((size) => size >= rough)!;
  const count = Math.ceil(most / step);
  return Array.from({ length: count + 1 }, (_, index) => index * step);
}
