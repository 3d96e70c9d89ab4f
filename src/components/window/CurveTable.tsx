import { formatClock, formatDay } from '../../domain/time/format';
import { MINUTE_MS } from '../../domain/time/interval';
import type { CurvePanel } from '../../domain/window/curvePanels';
import { FigureLabel } from '../ui/FigureLabel';

const ROW_MS = 15 * MINUTE_MS;

/** The curves in figures, a row every quarter of an hour. */
export function CurveTable({ timesMs, panels }: { timesMs: Float64Array; panels: CurvePanel[] }) {
  const rows = [...timesMs.keys()].filter((index) => timesMs[index]! % ROW_MS === 0);
  const dayOf = (index: number) => formatDay(timesMs[index]!);
  return (
    <div
      className="table-scroll"
      role="region"
      aria-label="The curves in figures"
      // Wider than a phone: it must be possible to scroll it by keys.
      // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex
      tabIndex={0}
    >
      <table className="curves__table table">
        <thead>
          <tr>
            <th scope="col" rowSpan={2}>
              UTC
            </th>
            {panels.map((panel) => (
              <th key={panel.figure} scope="colgroup" colSpan={panel.lines.length}>
                <FigureLabel figure={panel.figure}>{panel.title}</FigureLabel>, {panel.unit}
              </th>
            ))}
          </tr>
          <tr>
            {panels.flatMap((panel) =>
              panel.lines.map(({ label }) => (
                <th key={`${panel.figure} ${label}`} scope="col" className="figure">
                  {label}
                </th>
              )),
            )}
          </tr>
        </thead>
        <tbody>
          {rows.map((index, row) => (
            <tr key={timesMs[index]}>
              <th scope="row">
                {row === 0 || dayOf(index) !== dayOf(rows[row - 1]!) ? `${dayOf(index)} ` : ''}
                {formatClock(timesMs[index]!)}
              </th>
              {panels.flatMap((panel) =>
                panel.lines.map(({ label, values }) => (
                  <td key={`${panel.figure} ${label}`} className="figure">
                    {panel.format(values[index]!)}
                  </td>
                )),
              )}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
