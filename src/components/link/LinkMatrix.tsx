import type { LinkMatrix as Matrix, MatrixCell } from '../../domain/window/linkMatrix';
import { qualityFigure } from '../../domain/window/quality';
import { formatClock } from '../../domain/time/format';

interface Props {
  matrix: Matrix;
  /** The pair whose ledger stands below. */
  pair: { first: number; second: number } | null;
  /** Where a press leads, on a page without script; else `onPair`. */
  hrefOf?: (from: number, to: number) => string;
  onPair?: (from: number, to: number) => void;
}

/** The margin of every direction of a round; a press on one opens the ledger of its pair. */
export function LinkMatrix({ matrix, pair, hrefOf, onPair }: Props) {
  const { callSigns, cells, weakest, timeMs } = matrix;
  const inPair = (from: number, to: number) =>
    pair !== null && Math.min(from, to) === pair.first && Math.max(from, to) === pair.second;
  return (
    <div className="matrix">
      <table className="matrix__table">
        <caption className="label">
          Margins in dB at {formatClock(timeMs)} UTC: rows transmit, columns receive
        </caption>
        <thead>
          <tr>
            <td />
            {callSigns.map((callSign) => (
              <th scope="col" key={callSign}>
                <span className="sr-only">to </span>
                {callSign}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {callSigns.map((callSign, from) => (
            <tr key={callSign}>
              <th scope="row">
                <span className="sr-only">from </span>
                {callSign}
              </th>
              {callSigns.map((other, to) => {
                const cell = cells[from]![to];
                if (!cell) return <td key={other} className="matrix__self" />;
                const chosen = inPair(from, to);
                return (
                  <td key={other} className={chosen ? 'matrix__chosen' : undefined}>
                    <Cell
                      cell={cell}
                      name={`${callSign} to ${other}`}
                      chosen={chosen}
                      weakest={weakest?.from === from && weakest.to === to}
                      href={hrefOf?.(from, to)}
                      onOpen={onPair && (() => onPair(from, to))}
                    />
                  </td>
                );
              })}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

interface CellProps {
  cell: MatrixCell;
  name: string;
  chosen: boolean;
  weakest: boolean;
  href: string | undefined;
  onOpen: (() => void) | undefined;
}

function Cell({ cell, name, chosen, weakest, href, onOpen }: CellProps) {
  if ('why' in cell) return <span className="matrix__none">{cell.why}</span>;
  const { margin } = cell;
  const label = `${name}: ${qualityFigure(margin)} dB, ${margin.step}${weakest ? ', weakest' : ''}. Open the ledger.`;
  const inside = (
    <>
      <span className={`chip chip--${margin.step}`}>{qualityFigure(margin)}</span>
      <span className="matrix__word">{margin.step}</span>
      {weakest ? <span className="matrix__word matrix__weakest">weakest</span> : null}
    </>
  );
  return href === undefined ? (
    <button
      type="button"
      className="matrix__open"
      aria-label={label}
      aria-pressed={chosen}
      onClick={onOpen}
    >
      {inside}
    </button>
  ) : (
    <a className="matrix__open" aria-label={label} aria-current={chosen || undefined} href={href}>
      {inside}
    </a>
  );
}
