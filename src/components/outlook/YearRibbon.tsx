import type { Weekend } from '../../domain/outlook/weekends';
import type { OutlookDay } from '../../domain/outlook/year';
import { ribbonOf, type RibbonFrame, type Strip } from './ribbon';

interface Props {
  days: readonly OutlookDay[];
  best: readonly Weekend[];
  frame: RibbonFrame;
  label: string;
}

/** Some days in a row: degradation as shades, distance, declination and common hours as lines. */
export function YearRibbon({ days, best, frame, label }: Props) {
  const { height, strips, rampTop, ramp, sun, months, marks, axisY } = ribbonOf(days, best, frame);
  const { width, gutter } = frame;
  return (
    <svg className="chart ribbon" viewBox={`0 0 ${width} ${height}`} role="img" aria-label={label}>
      {marks.map((mark) => (
        <rect
          key={mark.rank}
          className="ribbon__weekend"
          x={mark.x}
          y={rampTop - 2}
          width={mark.width}
          height={axisY - rampTop + 2}
        />
      ))}
      {months.map((month) => (
        <g key={month.x}>
          <line className="ribbon__rule" x1={month.x} x2={month.x} y1={rampTop} y2={axisY + 4} />
          <text x={month.x + 3} y={axisY + 16}>
            {month.name}
          </text>
        </g>
      ))}
      <text
        x={gutter === 0 ? 0 : gutter - 10}
        y={gutter === 0 ? rampTop - 5 : rampTop + 11}
        textAnchor={gutter === 0 ? 'start' : 'end'}
      >
        Degradation
      </text>
      {ramp.map((run) => (
        <rect
          key={run.x}
          className={`band--${run.step}`}
          x={run.x}
          y={rampTop}
          width={run.width}
          height={14}
        />
      ))}
      <rect className="band__edge" x={gutter} y={rampTop} width={width - gutter} height={14} />
      {sun.map((run) => (
        <rect
          key={run.x}
          className="ribbon__sun"
          x={run.x}
          y={rampTop + 16}
          width={run.width}
          height={3}
        />
      ))}
      {marks.map((mark) => (
        <text
          key={mark.rank}
          className="chart__strong"
          x={mark.x + mark.width / 2}
          y={gutter === 0 ? 14 : rampTop - 8}
          textAnchor="middle"
        >
          {mark.rank}
        </text>
      ))}
      {strips.map((strip) => (
        <StripLine key={strip.name} strip={strip} width={width} gutter={gutter} />
      ))}
      <line className="raster__head" x1={gutter} x2={width} y1={axisY} y2={axisY} />
    </svg>
  );
}

function StripLine({ strip, width, gutter }: { strip: Strip; width: number; gutter: number }) {
  const { name, top, height, line, upper, lower, zero } = strip;
  return (
    <g>
      {gutter === 0 ? (
        <text x={0} y={top - 5}>
          {name}, {lower} to {upper}
        </text>
      ) : (
        <g textAnchor="end">
          <text x={gutter - 10} y={top + height / 2 + 4}>
            {name}
          </text>
          <text className="ribbon__figure" x={gutter - 10} y={top + 6}>
            {upper}
          </text>
          <text className="ribbon__figure" x={gutter - 10} y={top + height + 4}>
            {lower}
          </text>
        </g>
      )}
      <line className="ribbon__rule" x1={gutter} x2={width} y1={top} y2={top} />
      {zero === null ? null : (
        <line className="tide__ring" x1={gutter} x2={width} y1={zero} y2={zero} />
      )}
      <line className="ribbon__rule" x1={gutter} x2={width} y1={top + height} y2={top + height} />
      <path className="ribbon__line" d={line} />
    </g>
  );
}
