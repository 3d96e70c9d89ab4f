import { BAND_IDS, type BandId } from '../station/bands';
import { defaultMode, MODE_IDS, type ModeId } from '../station/modes';
import { DAY_MS, type Interval } from '../time/interval';

export const MOST_STATIONS = 16;
export const FEWEST_DAYS = 7;
export const MOST_DAYS = 60;

/** Everything the windows page asks. It lives in the address, so that a question can be sent to others. */
export interface WindowQuestion {
  /** Ids of listed stations, or places: a locator, with a time zone as "JO97ee@Europe/Stockholm". */
  stations: string[];
  band: BandId;
  /** Margins are computed for it; null judges by degradation. */
  mode: ModeId | null;
  /** Midnight UTC of the first day. */
  fromMs: number;
  days: number;
  /** Lowest elevation asked for, by station; null leaves the station's own limit. */
  lowestDeg: (number | null)[];
  minimumMinutes: number;
  maximumDegradationDb: number | null;
  /** Of the weaker direction; counts only while windows are judged by margin. */
  minimumMarginDb: number | null;
  minimumSunSeparationDeg: number | null;
  /** `awake`: only hours usable for everyone. `any`: all hours. */
  counting: 'awake' | 'any';
}

/** What is wrong with one field of the question, as a sentence. */
export interface QuestionProblem {
  field: string;
  sentence: string;
}

export const DEFAULT_MINIMUM_MINUTES = 30;
const DEFAULT_DAYS = 30;
const DEFAULT_BAND: BandId = '1296';
/** What stands in an address for a question without a mode. */
const NO_MODE = 'none';

export function startOfUtcDay(atMs: number): number {
  return Math.floor(atMs / DAY_MS) * DAY_MS;
}

/** "2027-01-18" */
export function utcDate(atMs: number): string {
  return new Date(atMs).toISOString().slice(0, 10);
}

export function questionSpan({ fromMs, days }: WindowQuestion): Interval {
  return { startMs: fromMs, endMs: fromMs + days * DAY_MS };
}

export function emptyQuestion(nowMs: number): WindowQuestion {
  return {
    stations: [],
    band: DEFAULT_BAND,
    mode: defaultMode(DEFAULT_BAND),
    fromMs: startOfUtcDay(nowMs),
    days: DEFAULT_DAYS,
    lowestDeg: [],
    minimumMinutes: DEFAULT_MINIMUM_MINUTES,
    maximumDegradationDb: null,
    minimumMarginDb: null,
    minimumSunSeparationDeg: null,
    counting: 'awake',
  };
}

/**
 * Reads a question from an address. What cannot be read keeps its default and is told in `problems`;
 * `lowestDeg` has one entry for each station.
 */
export function parseQuestion(
  params: URLSearchParams,
  nowMs: number,
): { question: WindowQuestion; problems: QuestionProblem[] } {
  const question = emptyQuestion(nowMs);
  const problems: QuestionProblem[] = [];
  const complain = (field: string, sentence: string) => problems.push({ field, sentence });

  const lows = params.getAll('low');
  params.getAll('station').forEach((raw, index) => {
    const token = raw.trim().slice(0, 160);
    if (token === '') return;
    if (question.stations.includes(token)) {
      complain('station', `${token} is named twice. Each station counts once.`);
      return;
    }
    if (question.stations.length === MOST_STATIONS) {
      if (index === MOST_STATIONS) {
        complain('station', `At most ${MOST_STATIONS} stations are compared at once.`);
      }
      return;
    }
    question.stations.push(token);
    question.lowestDeg.push(
      readNumber(lows[index], -5, 89, (sentence) =>
        complain('low', `Lowest elevation of station ${index + 1}: ${sentence}`),
      ),
    );
  });

  const band = params.get('band')?.trim();
  if (band) {
    const known = BAND_IDS.find((id) => id === band);
    if (known) question.band = known;
    else complain('band', `“${band.slice(0, 20)}” is not a band here. Choose one from the list.`);
  }
  question.mode = defaultMode(question.band);
  const mode = params.get('mode')?.trim().toLowerCase();
  if (mode === NO_MODE) question.mode = null;
  else if (mode) {
    const known = MODE_IDS.find((id) => id === mode);
    if (known) question.mode = known;
    else complain('mode', `“${mode.slice(0, 20)}” is not a mode here. Choose one from the list.`);
  }
  const from = params.get('from')?.trim();
  if (from) {
    const fromMs = readDate(from);
    if (fromMs === null) {
      complain(
        'from',
        `“${from.slice(0, 20)}” is not a date from 2000 to 2099. Write it as ${utcDate(nowMs)}.`,
      );
    } else question.fromMs = fromMs;
  }
  const days = readNumber(params.get('days') ?? undefined, FEWEST_DAYS, MOST_DAYS, (sentence) =>
    complain('days', `Days: ${sentence}`),
  );
  if (days !== null) question.days = Math.round(days);
  const minutes = readNumber(params.get('minutes') ?? undefined, 1, 1440, (sentence) =>
    complain('minutes', `Shortest window in minutes: ${sentence}`),
  );
  if (minutes !== null) question.minimumMinutes = Math.round(minutes);
  question.maximumDegradationDb = readNumber(params.get('loss') ?? undefined, 0, 30, (sentence) =>
    complain('loss', `Largest degradation in dB: ${sentence}`),
  );
  question.minimumMarginDb = readNumber(params.get('margin') ?? undefined, -20, 40, (sentence) =>
    complain('margin', `Least margin in dB: ${sentence}`),
  );
  question.minimumSunSeparationDeg = readNumber(params.get('sun') ?? undefined, 0, 90, (sentence) =>
    complain('sun', `Least distance from the Sun in degrees: ${sentence}`),
  );
  if (params.get('count') === 'any') question.counting = 'any';
  return { question, problems };
}

/** The address of a question; what is at its default is left out. */
export function questionParams(question: WindowQuestion): URLSearchParams {
  const params = new URLSearchParams();
  for (const station of question.stations) params.append('station', station);
  params.set('band', question.band);
  if (question.mode !== defaultMode(question.band)) params.set('mode', question.mode ?? NO_MODE);
  params.set('from', utcDate(question.fromMs));
  params.set('days', String(question.days));
  if (question.lowestDeg.some((low) => low !== null)) {
    question.stations.forEach((_, index) => {
      const low = question.lowestDeg[index] ?? null;
      params.append('low', low === null ? '' : String(low));
    });
  }
  if (question.minimumMinutes !== DEFAULT_MINIMUM_MINUTES) {
    params.set('minutes', String(question.minimumMinutes));
  }
  if (question.maximumDegradationDb !== null) {
    params.set('loss', String(question.maximumDegradationDb));
  }
  if (question.minimumMarginDb !== null) params.set('margin', String(question.minimumMarginDb));
  if (question.minimumSunSeparationDeg !== null) {
    params.set('sun', String(question.minimumSunSeparationDeg));
  }
  if (question.counting === 'any') params.set('count', 'any');
  return params;
}

function readNumber(
  text: string | undefined,
  least: number,
  most: number,
  complain: (sentence: string) => void,
): number | null {
  const trimmed = text?.trim().replace(',', '.').replace('\u2212', '-') ?? '';
  if (trimmed === '') return null;
  const value = Number(trimmed);
  if (!Number.isFinite(value)) {
    complain(`“${trimmed.slice(0, 20)}” is not a number.`);
    return null;
  }
  if (value < least || value > most) {
    complain(`${trimmed} is outside ${String(least).replace('-', '\u2212')} to ${most}.`);
    return null;
  }
  return value;
}

/** Midnight UTC of "2027-01-18", or null; 2000 to 2099. */
export function readDate(text: string): number | null {
  if (!/^20\d\d-\d\d-\d\d$/.test(text)) return null;
  const atMs = Date.parse(`${text}T00:00:00Z`);
  return Number.isNaN(atMs) || utcDate(atMs) !== text ? null : atMs;
}
