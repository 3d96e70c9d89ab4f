import { BANDS, type BandId } from '../station/bands';
import { callSignProblem } from '../station/callSign';
import { LocatorError, normalizeLocator } from '../locator/locator';

/** Columns of a roster file; the first is needed. */
export const ROSTER_COLUMNS = [
  'call sign',
  'mail',
  'locator',
  'bands',
  'most contacts',
  'coming',
  'note',
] as const;
export type RosterColumn = (typeof ROSTER_COLUMNS)[number];

/** More lines are not read. */
export const MOST_LINES = 200;
const LONGEST_NOTE = 1000;

/** One record of a file, with the number of the line on which it ends. */
export interface CsvRecord {
  line: number;
  cells: string[];
}

/** One line that can be understood. */
export interface RosterLine {
  line: number;
  callSign: string;
  /** In lower case; null where the cell is empty. */
  mail: string | null;
  locator: string | null;
  bands: BandId[] | null;
  mostContacts: number | null;
  coming: boolean | null;
  note: string;
}

export interface LineProblem {
  line: number;
  message: string;
}

export interface ReadRoster {
  lines: RosterLine[];
  problems: LineProblem[];
}

/**
 * The lines of a roster file, each checked by itself: what cannot be read stands in `problems` and the line is left
 * out. `offered` are the bands of the activity.
 */
export function readRosterRecords(
  records: readonly CsvRecord[],
  offered: readonly BandId[],
): ReadRoster {
  const [head, ...rest] = records;
  if (!head) return { lines: [], problems: [{ line: 1, message: 'The file is empty.' }] };
  const columns = columnsOf(head);
  if ('message' in columns) return { lines: [], problems: [columns] };
  const lines: RosterLine[] = [];
  const problems: LineProblem[] = [];
  const seen = new Map<string, number>();
  for (const record of rest) {
    if (record.cells.every((cell) => cell.trim() === '')) continue;
    if (lines.length + problems.length >= MOST_LINES) {
      problems.push({ line: record.line, message: `At most ${MOST_LINES} lines are read.` });
      break;
    }
    const read = readLine(record, columns, offered);
    const before = 'message' in read ? undefined : seen.get(read.callSign);
    if ('message' in read) problems.push(read);
    else if (before !== undefined) {
      problems.push({
        line: read.line,
        message: `${read.callSign} stands on line ${before} already.`,
      });
    } else {
      seen.set(read.callSign, read.line);
      lines.push(read);
    }
  }
  if (lines.length === 0 && problems.length === 0) {
    problems.push({ line: head.line, message: 'There is no line below the names of the columns.' });
  }
  return { lines, problems };
}

type Columns = Partial<Record<RosterColumn, number>>;

function columnsOf({ line, cells }: CsvRecord): Columns | LineProblem {
  const columns: Columns = {};
  for (const [index, cell] of cells.entries()) {
    const name = cell
      .trim()
      .toLowerCase()
      .replace(/[_\s]+/g, ' ');
    if (name === '') continue;
    const column = ROSTER_COLUMNS.find((one) => one === name);
    if (!column) {
      return {
        line,
        message: `There is no column “${shown(cell)}”. The columns are ${ROSTER_COLUMNS.join(', ')}.`,
      };
    }
    if (columns[column] !== undefined) {
      return { line, message: `The column “${column}” is there twice.` };
    }
    columns[column] = index;
  }
  if (columns['call sign'] === undefined) {
    return {
      line,
      message: 'The first line must name the columns, and one of them must be “call sign”.',
    };
  }
  return columns;
}

function readLine(
  { line, cells }: CsvRecord,
  columns: Columns,
  offered: readonly BandId[],
): RosterLine | LineProblem {
  const cell = (column: RosterColumn) => (cells[columns[column] ?? -1] ?? '').trim();
  try {
    const known = Object.values(columns);
    const beyond = cells.findIndex((text, index) => text.trim() !== '' && !known.includes(index));
    if (beyond >= 0) throw new CellError(`“${shown(cells[beyond]!)}” stands in no column.`);
    return {
      line,
      callSign: callSignOf(cell('call sign')),
      mail: cell('mail').toLowerCase() || null,
      locator: locatorOf(cell('locator')),
      bands: bandsOf(cell('bands'), offered),
      mostContacts: mostOf(cell('most contacts')),
      coming: comingOf(cell('coming')),
      note: noteOf(cell('note')),
    };
  } catch (error) {
    if (error instanceof CellError) return { line, message: error.message };
    throw error;
  }
}

class CellError extends Error {}

function callSignOf(text: string): string {
  const callSign = text.toUpperCase();
  const problem = callSignProblem(callSign);
  if (problem) throw new CellError(text === '' ? problem : `“${shown(text)}”: ${problem}`);
  return callSign;
}

function locatorOf(text: string): string | null {
  if (text === '') return null;
  try {
    return normalizeLocator(text);
  } catch (error) {
    if (error instanceof LocatorError) throw new CellError(error.message);
    throw error;
  }
}

/** "432 1296", "432; 10 GHz", "432/1296"; empty: not said. */
function bandsOf(text: string, offered: readonly BandId[]): BandId[] | null {
  if (text === '') return null;
  const bands = text
    .replace(/(\d)\s*([gm]hz)/gi, '$1$2')
    .split(/[\s;,/+&]+/)
    .filter((name) => name !== '')
    .map((name) => {
      const band = BANDS.find(({ id, label }) =>
        [id, `${id}mhz`, label.replace(/\s/g, '').toLowerCase()].includes(name.toLowerCase()),
      );
      if (!band) throw new CellError(`“${shown(name)}” is not a band, such as 432 or 10 GHz.`);
      if (!offered.includes(band.id)) {
        throw new CellError(`${band.label} is not a band of this activity.`);
      }
      return band.id;
    });
  return offered.filter((band) => bands.includes(band));
}

function mostOf(text: string): number | null {
  if (text === '') return null;
  const most = Number(text);
  if (!/^\d{1,3}$/.test(text) || most < 1) {
    throw new CellError(
      `Most contacts “${shown(text)}” must be a whole number from 1 to 999, or nothing.`,
    );
  }
  return most;
}

function comingOf(text: string): boolean | null {
  if (text === '') return null;
  if (/^(yes|y|1|true)$/i.test(text)) return true;
  if (/^(no|n|0|false)$/i.test(text)) return false;
  throw new CellError(`Coming “${shown(text)}” must be yes, no or nothing.`);
}

function noteOf(text: string): string {
  if (text.length > LONGEST_NOTE) {
    throw new CellError(
      `The note has ${text.length} characters; at most ${LONGEST_NOTE} are kept.`,
    );
  }
  return text.replace(/[\p{Cc}\p{Cf}]+/gu, ' ').trim();
}

/** A cell as a message quotes it: short, on one line. */
function shown(text: string): string {
  const line = text.replace(/[\p{Cc}\p{Cf}\s]+/gu, ' ').trim();
  return line.length > 24 ? `${line.slice(0, 24)}…` : line;
}
