import { memo } from 'react';
import type { TimetableStation } from '../../../domain/activity/timetableView';
import { subtractIntervals, type Interval } from '../../../domain/time/interval';
import { hillPath, hourLines, ROW_PX, widthOf, xOf } from './geometry';

/** The ground of a station's row: hours, sleep, and the Moon's height. */
export const RowGround = memo(function RowGround({
  station,
  span,
}: {
  station: TimetableStation;
  span: Interval;
}) {
  const width = widthOf(span);
  const asleep = subtractIntervals([span], station.usable);
  return (
    <svg className="tt-ground" width={width} height={ROW_PX} aria-hidden="true">
      {asleep.map((stretch) => (
        <rect
          key={stretch.startMs}
          x={xOf(span, stretch.startMs)}
          width={xOf(span, stretch.endMs) - xOf(span, stretch.startMs)}
          height={ROW_PX}
          fill="url(#tt-asleep)"
        />
      ))}
      <path className="tt-hill" d={hillPath(span, station.moonElevationDeg)} />
      {hourLines(span).map(({ x, line }) => (
        <path key={x} className={`tt-line tt-line--${line}`} d={`M${x} 0V${ROW_PX}`} />
      ))}
    </svg>
  );
});

/** Where the slot that is held may be put down, framed. */
export function Stretches({ stretches, span }: { stretches: readonly Interval[]; span: Interval }) {
  return (
    <>
      {stretches.map((stretch) => (
        <span
          key={stretch.startMs}
          className="tt-stretch"
          style={{
            left: xOf(span, stretch.startMs),
            width: xOf(span, stretch.endMs) - xOf(span, stretch.startMs),
          }}
        />
      ))}
    </>
  );
}
