import { BAND_IDS, type BandId } from '../station/bands';
import { readDate, startOfUtcDay, utcDate } from '../window/question';

export const OUTLOOK_DAYS = 365;
const DEFAULT_BAND: BandId = '144';

/** What the outlook page asks; it lives in the address. Ends are regions, call signs, station ids or locators. */
export interface OutlookQuestion {
  here: string;
  there: string;
  band: BandId;
  fromMs: number;
}

/**
 * Reads a question from an address. What cannot be read keeps its default and is told in `problems`; who the ends
 * are is looked up later.
 */
export function parseOutlookQuestion(
  params: URLSearchParams,
  nowMs: number,
): { question: OutlookQuestion; problems: string[] } {
  const problems: string[] = [];
  const question: OutlookQuestion = {
    here: end(params.get('here')) ?? 'Europe',
    there: end(params.get('there')) ?? 'North America',
    band: DEFAULT_BAND,
    fromMs: startOfUtcDay(nowMs),
  };
  const band = params.get('band')?.trim();
  if (band) {
    const known = BAND_IDS.find((id) => id === band);
    if (known) question.band = known;
    else problems.push(`“${band.slice(0, 20)}” is not a band here. Choose one from the list.`);
  }
  const from = params.get('from')?.trim();
  if (from) {
    const fromMs = readDate(from);
    if (fromMs !== null) question.fromMs = fromMs;
    else {
      problems.push(
        `“${from.slice(0, 20)}” is not a date from 2000 to 2099. Write it as ${utcDate(nowMs)}.`,
      );
    }
  }
  return { question, problems };
}

function end(raw: string | null): string | null {
  const text = raw?.trim().slice(0, 80) ?? '';
  return text === '' ? null : text;
}
