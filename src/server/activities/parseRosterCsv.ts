import { CsvError, parse } from 'csv-parse/sync';
import type { CsvRecord, LineProblem } from '../../domain/activity/rosterCsv';

/** Characters of one record, quotation marks and all. */
const LONGEST_RECORD = 8000;
const SEPARATORS = [',', ';', '\t'] as const;

/** The records of a file with commas, semicolons or tabs between the cells, or what broke it. */
export function parseRosterCsv(text: string): CsvRecord[] | LineProblem {
  try {
    const records = parse(text, {
      bom: true,
      delimiter: separatorOf(text),
      info: true,
      relax_column_count: true,
      skip_empty_lines: true,
      max_record_size: LONGEST_RECORD,
    }) as unknown as { info: { lines: number }; record: string[] }[];
    return records.map(({ info, record }) => ({ line: info.lines, cells: record }));
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    return { line: lineOf(error), message: sentenceOf(error) };
  }
}

/** Whichever the first line has most of. */
function separatorOf(text: string): string {
  const head = text.slice(0, LONGEST_RECORD).split(/\r?\n|\r/, 1)[0] ?? '';
  const count = (separator: string) => head.split(separator).length;
  return [...SEPARATORS].sort((a, b) => count(b) - count(a))[0]!;
}

function lineOf(error: CsvError): number {
  const lines: unknown = (error as CsvError & { lines?: unknown }).lines;
  return typeof lines === 'number' ? lines : 1;
}

function sentenceOf({ code }: CsvError): string {
  if (code === 'CSV_MAX_RECORD_SIZE') {
    return `A line is longer than ${LONGEST_RECORD} characters. Nothing was read.`;
  }
  if (code === 'CSV_QUOTE_NOT_CLOSED') return 'A quotation mark is opened and never closed.';
  if (code === 'INVALID_OPENING_QUOTE' || code === 'CSV_INVALID_CLOSING_QUOTE') {
    return 'A quotation mark stands in the middle of a cell. Double it inside quoted cells.';
  }
  return 'The file is not comma-separated text that can be read.';
}
