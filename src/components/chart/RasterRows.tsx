import { memo } from 'react';
import { DateTime } from 'luxon';
import { formatHoursMinutes } from '../../domain/time/format';
import { DAY_MS } from '../../domain/time/interval';
import type { RasterDay } from '../../domain/window/layers';
import type { MoonPhase } from '../../domain/window/moonPhase';
import { qualityFigure } from '../../domain/window/quality';
import { MoonGlyph } from './MoonGlyph';
import { rowTop, type RasterFrame } from './rasterGeometry';
import type { RasterAxis } from './rasterView';

const AXIS_HEIGHT = 17;
const USABLE_FROM_RIGHT = 56;
const BASELINE = 4.5;

function rowBaseline(frame: RasterFrame, row: number): number {
  return rowTop(frame, row) + frame.rowHeight / 2 + BASELINE;
}

/** Axes, lines and days: what stays while limits change. */
export const RasterRows = memo(function RasterRows({
  frame,
  axes,
  phases,
  chosenRow,
}: {
  frame: RasterFrame;
  axes: RasterAxis[];
  phases: MoonPhase[];
  chosenRow: number | null;
}) {
  const bottom = frame.top + frame.days * frame.rowHeight;
  const dates = Array.from({ length: frame.days }, (_, row) =>
    DateTime.fromMillis(frame.fromMs + row * DAY_MS, { zone: 'utc' }),
  );
  const lines = (monday: boolean) =>
    dates
      .map((date, row) =>
        row > 0 && (date.weekday === 1) === monday ? `M0 ${rowTop(frame, row)}H${frame.width}` : '',
      )
      .join('');
  const hours = Array.from(
    { length: 13 },
    (_, index) => `M${frame.left + index * 2 * frame.hourWidth} ${frame.top}V${bottom}`,
  ).join('');
  return (
    <g aria-hidden="true">
      <path className="raster__rule" d={lines(false) + hours} />
      <path className="raster__week" d={lines(true)} />
      <path
        className="raster__head"
        d={`M0 ${frame.top}H${frame.width}M0 ${bottom}H${frame.width}`}
      />
      {axes.map((axis, index) => (
        <g
          key={axis.label}
          className={index === 0 ? 'raster__axis raster__axis--utc' : 'raster__axis'}
        >
          <text x={0} y={13 + index * AXIS_HEIGHT}>
            {axis.label}
          </text>
          {axis.hours.map((hour, at) => (
            <text
              key={at}
              x={frame.left + at * 2 * frame.hourWidth}
              y={13 + index * AXIS_HEIGHT}
              textAnchor="middle"
              className={hour.length > 2 ? 'raster__small' : undefined}
            >
              {hour}
            </text>
          ))}
        </g>
      ))}
      <text x={frame.width - USABLE_FROM_RIGHT} y={frame.top - 12} textAnchor="end">
        usable
      </text>
      <text x={frame.width} y={frame.top - 12} textAnchor="end">
        best, dB
      </text>
      {dates.map((date, row) => (
        <g
          key={row}
          className={
            date.weekday > 5 || row === chosenRow
              ? 'raster__day raster__day--strong'
              : 'raster__day'
          }
        >
          <text x={0} y={rowBaseline(frame, row)}>
            {date.toFormat('ccc')}
          </text>
          <text x={47} y={rowBaseline(frame, row)} textAnchor="end">
            {date.day}
          </text>
          {row === 0 || date.day === 1 ? (
            <text x={52} y={rowBaseline(frame, row)} className="raster__small">
              {date.toFormat('LLL')}
            </text>
          ) : null}
          <MoonGlyph phase={phases[row]!} x={86} y={rowBaseline(frame, row) - BASELINE} r={4.5} />
        </g>
      ))}
      {chosenRow === null ? null : (
        <path
          className="raster__wedge"
          d={`M-14 ${rowTop(frame, chosenRow) + frame.rowHeight / 2 - 5}l7 5l-7 5z`}
        />
      )}
    </g>
  );
});

/** The columns at the right: usable hours and best figure of each day. */
export const RasterSums = memo(function RasterSums({
  frame,
  days,
}: {
  frame: RasterFrame;
  days: RasterDay[];
}) {
  return (
    <g aria-hidden="true">
      {days.map((day, row) => (
        <g key={day.startMs} className="raster__day">
          {day.usableMs > 0 ? (
            <text x={frame.width - USABLE_FROM_RIGHT} y={rowBaseline(frame, row)} textAnchor="end">
              {formatHoursMinutes(day.usableMs)}
            </text>
          ) : null}
          <text
            x={frame.width}
            y={rowBaseline(frame, row)}
            textAnchor="end"
            className={day.best ? 'chart__strong' : undefined}
          >
            {day.best ? qualityFigure(day.best) : '–'}
          </text>
        </g>
      ))}
    </g>
  );
});
