import { z } from 'zod';
import { BAND_IDS, bandById, type BandId } from '../station/bands';
import { figure, record, words } from '../station/fields';
import { MODE_IDS } from '../station/modes';
import { DAY_MS, MINUTE_MS } from '../time/interval';
import type { ActivityBand } from './bands';
import { weightsSchema, type ActivityWeights } from './weights';

/** "As many as you like" in a row, as it is stored. */
export const NO_LIMIT_IN_A_ROW = 99;
export const GRID_MINUTES = [5, 10, 15, 20, 30, 60] as const;
export const LONGEST_DAYS = 7;
const FARTHEST_DAYS = 2 * 366;

/** What a coordinator decides about an activity. */
export interface ActivitySettings {
  title: string;
  startMs: number;
  endMs: number;
  bands: ActivityBand[];
  slotMinutes: number;
  gridMinutes: number;
  bandChangeMinutes: number;
  mostInARow: number;
  leastPauseMinutes: number;
  weights: ActivityWeights;
  invitation: string;
  notes: string;
  answersByMs: number | null;
}

/** Day and clock time of a form, in UTC, as an instant; both empty: nothing; what cannot be read stays as it is. */
export function instantOfForm(value: unknown): unknown {
  if (typeof value !== 'object' || value === null) return value;
  const { day, clock } = value as { day?: unknown; clock?: unknown };
  if (typeof day !== 'string' || typeof clock !== 'string') return value;
  if (day.trim() === '' && clock.trim() === '') return undefined;
  const match = /^(\d{4}-\d{2}-\d{2}) ([01]?\d|2[0-3]):?([0-5]\d)$/.exec(
    `${day.trim()} ${clock.trim() || '00:00'}`,
  );
  if (!match) return value;
  const atMs = Date.parse(`${match[1]}T${match[2]!.padStart(2, '0')}:${match[3]}:00Z`);
  // 31 February would be some day in March.
  const there = !Number.isNaN(atMs) && new Date(atMs).toISOString().startsWith(match[1]!);
  return there ? atMs : value;
}

/** The instant as a form of UTC times shows it. */
export function formOfInstant(atMs: number): string {
  return new Date(atMs).toISOString().slice(0, 16);
}

const instant = (what: string) =>
  z.preprocess(
    instantOfForm,
    z.number({ error: `${what} must be a day and a time in UTC, such as 2027-02-13 and 18:00.` }),
  );

/** A number of a form or of JSON; "" is missing. */
function typedNumber(value: unknown): unknown {
  if (typeof value !== 'string') return value;
  const text = value.trim().replace(',', '.').replace('−', '-');
  if (text === '') return undefined;
  return /^-?\d+(\.\d+)?$/.test(text) ? Number(text) : value;
}

const typed = <T extends z.ZodType>(schema: T) => z.preprocess(typedNumber, schema);

const minutes = (what: string, least: number, most: number) =>
  typed(figure(what, least, most, 'minutes').int(`${what} must be whole minutes.`));

const bandSchema = z.object({
  on: z.literal('yes').optional(),
  frequencyMhz: typed(z.union([z.number(), z.string()]).optional()),
  mode: z.string().optional(),
});

const bandsSchema = z
  .partialRecord(z.enum(BAND_IDS), bandSchema, {
    error: 'Choose the bands from the list.',
  })
  .optional()
  .transform((given, context) => {
    const bands: ActivityBand[] = [];
    for (const id of BAND_IDS) {
      const entry = given?.[id];
      if (entry?.on !== 'yes') continue;
      const band = bandById(id);
      const frequencyMhz = entry.frequencyMhz ?? band.centreMhz;
      if (
        typeof frequencyMhz !== 'number' ||
        !(frequencyMhz >= band.fromMhz && frequencyMhz <= band.toMhz)
      ) {
        context.addIssue({
          code: 'custom',
          path: [id, 'frequencyMhz'],
          message: `The frequency on ${band.label} must lie between ${band.fromMhz} and ${band.toMhz} MHz.`,
        });
        continue;
      }
      const mode = MODE_IDS.find((one) => one === entry.mode);
      if (!mode) {
        context.addIssue({
          code: 'custom',
          path: [id, 'mode'],
          message: `Choose a mode on ${band.label} from the list.`,
        });
        continue;
      }
      bands.push({ band: id satisfies BandId, frequencyMhz, mode });
    }
    return bands;
  });

const weightsOfForm = z.preprocess((value) => {
  if (typeof value !== 'object' || value === null) return value;
  const given = value as Record<string, unknown>;
  return {
    ...given,
    leastChance: typedNumber(given['leastChance']),
    leastElevationDeg: typedNumber(given['leastElevationDeg']),
  };
}, weightsSchema);

const shape = record({
  title: words('The title', 80, 1).regex(
    /^[^\p{Cc}\p{Cf}<>]*$/u,
    'A title has no control characters and no angle brackets.',
  ),
  start: instant('The start'),
  end: instant('The end'),
  bands: bandsSchema,
  slotMinutes: minutes('The slot', 10, 240),
  gridMinutes: typed(
    z.literal(GRID_MINUTES, { error: 'Slots can begin every 5, 10, 15, 20, 30 or 60 minutes.' }),
  ),
  bandChangeMinutes: minutes('The time for changing bands', 0, 240),
  mostInARow: typed(
    figure('Contacts in a row', 1, NO_LIMIT_IN_A_ROW).int('Contacts in a row are a whole number.'),
  ),
  leastPauseMinutes: minutes('The pause', 0, 720),
  weights: weightsOfForm,
  invitation: words('The invitation', 4000),
  notes: words('The public notes', 4000),
  answersBy: z.preprocess(instantOfForm, instant('Answers by').optional()),
});

/** What of the settings does not fit together, with the field it belongs to. */
export function settingsProblems(
  settings: ActivitySettings,
  nowMs: number,
): { path: string; message: string }[] {
  const problems: { path: string; message: string }[] = [];
  const { startMs, endMs, slotMinutes, gridMinutes, answersByMs } = settings;
  const lengthMs = endMs - startMs;
  if (lengthMs <= 0) problems.push({ path: 'end', message: 'The end must come after the start.' });
  else if (lengthMs > LONGEST_DAYS * DAY_MS) {
    problems.push({ path: 'end', message: `An activity lasts at most ${LONGEST_DAYS} days.` });
  } else if (lengthMs < slotMinutes * MINUTE_MS) {
    problems.push({ path: 'end', message: 'The activity is shorter than one slot.' });
  }
  if (endMs <= nowMs) problems.push({ path: 'end', message: 'The activity lies in the past.' });
  if (startMs > nowMs + FARTHEST_DAYS * DAY_MS) {
    problems.push({ path: 'start', message: 'Plan at most two years ahead.' });
  }
  if (slotMinutes % gridMinutes !== 0) {
    problems.push({
      path: 'slotMinutes',
      message: `A slot of ${slotMinutes} minutes does not fit starts every ${gridMinutes} minutes. Make it a multiple.`,
    });
  }
  if (settings.bands.length === 0) {
    problems.push({ path: 'bands', message: 'Choose at least one band.' });
  }
  if (answersByMs !== null && answersByMs >= endMs) {
    problems.push({ path: 'answersBy', message: 'Answers are due before the activity ends.' });
  }
  return problems;
}

/** The settings from a form (names are dotted paths) or from JSON. Its rules: `settingsProblems`. */
export const activitySettingsSchema = shape.transform(
  ({ start, end, answersBy, ...rest }): ActivitySettings => ({
    ...rest,
    startMs: start,
    endMs: end,
    answersByMs: answersBy ?? null,
  }),
);

/** "bands.432.mode" of a flat form as objects within objects. */
export function nestedFields(values: Readonly<Record<string, string>>): Record<string, unknown> {
  const tree: Record<string, unknown> = Object.create(null) as Record<string, unknown>;
  for (const [name, value] of Object.entries(values)) {
    const steps = name.split('.');
    let at = tree;
    for (const step of steps.slice(0, -1)) {
      const below = at[step];
      const next =
        typeof below === 'object' && below !== null
          ? (below as Record<string, unknown>)
          : (Object.create(null) as Record<string, unknown>);
      at[step] = next;
      at = next;
    }
    at[steps.at(-1)!] = value;
  }
  return tree;
}
