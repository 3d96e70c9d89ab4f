import type { HorizonPoint } from '../sky/limits';
import { MAX_HORIZON_POINTS } from './skySchema';

export const MAX_HORIZON_CSV_BYTES = 100_000;
const MAX_LINES = 2000;
const MAX_PROBLEMS = 20;

export interface CsvProblem {
  /** Counted from 1; 0 where the problem is the file as a whole. */
  line: number;
  message: string;
}

export interface HorizonCsv {
  /** By rising azimuth, each once, 0 ≤ azimuth < 360; empty when there is any problem. */
  points: HorizonPoint[];
  problems: CsvProblem[];
}

/**
 * Reads a horizon profile: two columns, azimuth and elevation in degrees, parted by comma, semicolon or
 * tab. With semicolon or tab the decimal sign may be a comma. A line of names may stand first (and may
 * name the elevation first), lines that begin with # are passed over. Azimuth 360 is 0.
 * Nothing is accepted unless every line is good.
 */
export function parseHorizonCsv(text: string): HorizonCsv {
  const whole = (message: string): HorizonCsv => ({ points: [], problems: [{ line: 0, message }] });
  if (new TextEncoder().encode(text).length > MAX_HORIZON_CSV_BYTES) {
    return whole('The file is larger than 100 kB.');
  }
  const allLines = text.replace(/^\uFEFF/, '').split(/\r\n|\n|\r/);
  if (allLines.length > MAX_LINES + 1) return whole(`The file has more than ${MAX_LINES} lines.`);
  const lines = allLines
    .map((content, index) => ({ content: content.trim(), line: index + 1 }))
    .filter(({ content }) => content !== '' && !content.startsWith('#'));
  if (lines.length === 0) return whole('The file holds no points.');

  const separator = separatorOf(lines.map(({ content }) => content));
  const problems: CsvProblem[] = [];
  const found = new Map<number, { elevationDeg: number; line: number; from360: boolean }>();
  let elevationFirst = false;

  lines.forEach(({ content, line }, index) => {
    const cells = cellsOf(content, separator);
    if (index === 0 && isHeader(cells, separator)) {
      elevationFirst = /^el/i.test(cells[0]!) && /^az/i.test(cells[1] ?? '');
      return;
    }
    const read = readLine(cells, separator, elevationFirst);
    if (typeof read === 'string') {
      problems.push({ line, message: `Line ${line}: ${read}` });
      return;
    }
    const from360 = read.azimuthDeg === 360;
    const azimuthDeg = from360 ? 0 : read.azimuthDeg;
    const before = found.get(azimuthDeg);
    if (!before) {
      found.set(azimuthDeg, { elevationDeg: read.elevationDeg, line, from360 });
    } else if (from360 === before.from360 || before.elevationDeg !== read.elevationDeg) {
      const shown = from360 === before.from360 ? `azimuth ${read.azimuthDeg}` : 'north, 0 or 360,';
      problems.push({
        line,
        message: `Line ${line}: ${shown} already stands in line ${before.line}.`,
      });
    }
  });

  if (problems.length === 0 && found.size === 0) return whole('The file holds no points.');
  if (found.size > MAX_HORIZON_POINTS) {
    problems.push({
      line: 0,
      message: `The file has ${found.size} points; at most ${MAX_HORIZON_POINTS} are kept.`,
    });
  }
  if (problems.length > 0) return { points: [], problems: shortened(problems) };
  const points = [...found]
    .map(([azimuthDeg, { elevationDeg }]) => ({ azimuthDeg, elevationDeg }))
    .sort((a, b) => a.azimuthDeg - b.azimuthDeg);
  return { points, problems: [] };
}

type Separator = ';' | '\t' | ',';

function separatorOf(lines: string[]): Separator {
  if (lines.some((line) => line.includes(';'))) return ';';
  if (lines.some((line) => line.includes('\t'))) return '\t';
  return ',';
}

function cellsOf(line: string, separator: Separator): string[] {
  const cells = line.split(separator).map((cell) =>
    cell
      .trim()
      .replace(/^"(.*)"$/, '$1')
      .trim(),
  );
  while (cells.length > 2 && cells.at(-1) === '') cells.pop();
  return cells;
}

function isHeader(cells: string[], separator: Separator): boolean {
  return (
    cells.length >= 2 &&
    cells.every((cell) => /\p{L}/u.test(cell) && numberOf(cell, separator) === null)
  );
}

/** The number in the cell, or null. Accepts the degree sign and U+2212. */
function numberOf(cell: string, separator: Separator): number | null {
  let text = cell.replace(/\s*°$/, '').replace(/^\u2212/, '-');
  if (separator !== ',') text = text.replace(',', '.');
  return /^[+-]?(\d+(\.\d*)?|\.\d+)$/.test(text) ? Number(text) : null;
}

/** The point, or a sentence saying what is wrong. */
function readLine(
  cells: string[],
  separator: Separator,
  elevationFirst: boolean,
): HorizonPoint | string {
  if (cells.length !== 2) {
    const hint =
      separator === ',' && cells.length === 4
        ? ' For decimal commas, part the columns with semicolons.'
        : '';
    const count = cells.length === 1 ? '1 column' : `${cells.length} columns`;
    return `${count} found where azimuth and elevation are needed.${hint}`;
  }
  const [azimuthCell, elevationCell] = elevationFirst
    ? [cells[1]!, cells[0]!]
    : [cells[0]!, cells[1]!];
  const azimuthDeg = numberOf(azimuthCell, separator);
  if (azimuthDeg === null) return `azimuth “${shown(azimuthCell)}” is not a number.`;
  const elevationDeg = numberOf(elevationCell, separator);
  if (elevationDeg === null) return `elevation “${shown(elevationCell)}” is not a number.`;
  if (azimuthDeg < 0) return `azimuth ${shown(azimuthCell)} is under 0.`;
  if (azimuthDeg > 360) return `azimuth ${shown(azimuthCell)} is over 360.`;
  if (elevationDeg < -90) return `elevation ${shown(elevationCell)} is under −90.`;
  if (elevationDeg > 90) return `elevation ${shown(elevationCell)} is over 90.`;
  return { azimuthDeg, elevationDeg };
}

function shown(cell: string): string {
  return cell.length > 20 ? `${cell.slice(0, 20)}…` : cell;
}

function shortened(problems: CsvProblem[]): CsvProblem[] {
  if (problems.length <= MAX_PROBLEMS) return problems;
  const left = problems.length - MAX_PROBLEMS;
  return [
    ...problems.slice(0, MAX_PROBLEMS),
    { line: 0, message: `${left} more ${left === 1 ? 'line has' : 'lines have'} a problem.` },
  ];
}
