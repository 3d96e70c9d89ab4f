import type { LinkResult } from '../link/budget';
import { qualityFigure, qualityOfMargin, type Quality } from './quality';

/** The link of stations `first` and `second`, by their places in the list; null where equipment is missing. */
export interface PairLink {
  first: number;
  second: number;
  link: LinkResult | null;
}

/** One direction of a pair: its margin, or in a word or two why it has none. */
export type MatrixCell = { margin: Quality } | { why: string };

/** Every direction of a round at one instant: rows transmit, columns receive. */
export interface LinkMatrix {
  timeMs: number;
  callSigns: readonly string[];
  /** By transmitting, then receiving station; null on the diagonal. */
  cells: readonly (readonly (MatrixCell | null)[])[];
  /** Null where no direction has a margin. */
  weakest: { from: number; to: number } | null;
  /** "The weakest of 6 directions decides: QB7TID to QA1LUN, −2.1 dB, below." */
  sentence: string;
}

/** All pairs of so many stations, in the order in which a judge keeps their links. */
export function pairsOf(stations: number): { first: number; second: number }[] {
  return Array.from({ length: stations }, (_, first) =>
    Array.from({ length: stations - first - 1 }, (_, gap) => ({ first, second: first + 1 + gap })),
  ).flat();
}

/** Puts the links of every pair into one table. */
export function linkMatrix(
  callSigns: readonly string[],
  pairs: readonly PairLink[],
  timeMs: number,
): LinkMatrix {
  const cells: (MatrixCell | null)[][] = callSigns.map(() => callSigns.map(() => null));
  let weakest: LinkMatrix['weakest'] = null;
  let weakestDb = Infinity;
  let known = 0;
  for (const { first, second, link } of pairs) {
    for (const way of [0, 1] as const) {
      const [from, to] = way === 0 ? [first, second] : [second, first];
      const cell = cellOf(link, way);
      cells[from]![to] = cell;
      if (!('margin' in cell)) continue;
      known += 1;
      if (cell.margin.db >= weakestDb) continue;
      weakestDb = cell.margin.db;
      weakest = { from, to };
    }
  }
  return {
    timeMs,
    callSigns,
    cells,
    weakest,
    sentence: sentenceOf(callSigns, cells, weakest, known),
  };
}

function cellOf(link: LinkResult | null, way: 0 | 1): MatrixCell {
  if (!link) return { why: 'no equipment' };
  if (!link.moonUp) return { why: 'Moon down' };
  return { margin: qualityOfMargin(link.directions[way].marginDb) };
}

function sentenceOf(
  callSigns: readonly string[],
  cells: LinkMatrix['cells'],
  weakest: LinkMatrix['weakest'],
  known: number,
): string {
  const cell = weakest && cells[weakest.from]![weakest.to];
  if (!weakest || !cell || !('margin' in cell)) return 'No direction has a margin then.';
  const way = `${callSigns[weakest.from]} to ${callSigns[weakest.to]}`;
  const all = callSigns.length * (callSigns.length - 1);
  const which = known === all ? `${all} directions` : `the ${known} directions known, of ${all},`;
  return `The weakest of ${which} decides: ${way}, ${qualityFigure(cell.margin)} dB, ${cell.margin.step}.`;
}
