import { valueAt, type CurvePanel } from '../../domain/window/curvePanels';
import type { Interval } from '../../domain/time/interval';
import { formatClock } from '../../domain/time/format';
import { FigureLabel } from '../ui/FigureLabel';
import { CurvePlot } from './CurvePlot';
import { lineStyle } from './curveStyle';

interface Props {
  timesMs: Float64Array;
  panels: CurvePanel[];
  shown: Interval;
  window: Interval;
  width: number;
  cursorMs: number;
  onCursor: (atMs: number) => void;
}

/** Panels under one another on one axis of UTC, with one hand through all of them. */
export function CurvePanels({ timesMs, panels, shown, window, width, cursorMs, onCursor }: Props) {
  return (
    <div className="curves__panels">
      {panels.map((panel, index) => (
        <figure key={panel.figure} className="curve">
          <figcaption className="curve__head">
            <span className="curve__title">
              <FigureLabel figure={panel.figure}>{panel.title}</FigureLabel>, {panel.unit}
            </span>
            <span className="curve__legend">
              {panel.lines.map(({ label, values }, line) => (
                <span key={label} className="curve__entry">
                  <Sample index={line} /> {label}{' '}
                  <strong className="curve__value">
                    {panel.format(valueAt(timesMs, values, cursorMs, panel.wrapsAt))}
                  </strong>
                </span>
              ))}
            </span>
          </figcaption>
          <CurvePlot
            timesMs={timesMs}
            panel={panel}
            shown={shown}
            window={window}
            width={width}
            withHours={index === panels.length - 1}
            cursorMs={cursorMs}
            onCursor={onCursor}
          />
        </figure>
      ))}
      <p className="label">
        Hours in UTC; figures at {formatClock(cursorMs)} UTC. The light ground is the window. Drag
        in a curve, or move the time cursor of the tide by its arrow keys.
      </p>
    </div>
  );
}

/** The line as it is drawn. */
function Sample({ index }: { index: number }) {
  const { tone, dash } = lineStyle(index);
  return (
    <svg className={`curve__sample curve__sample--${tone}`} viewBox="0 0 28 8" aria-hidden="true">
      <path d="M0 4H28" strokeDasharray={dash.join(' ') || undefined} />
    </svg>
  );
}
