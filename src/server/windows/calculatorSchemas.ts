import { z } from 'zod';
import { HIGHEST_FREQUENCY_MHZ, LOWEST_FREQUENCY_MHZ } from '../../domain/link/check';
import type { SkyLimits } from '../../domain/sky';
import { figure, record } from '../../domain/station/fields';
import { MODE_IDS } from '../../domain/station/modes';
import { DAY_MS } from '../../domain/time/interval';
import { setupSchema } from './setupSchema';
import { calculatorSkySchema, siteSchema } from './siteSchema';

export const MAX_TIMES = 2000;
export const MAX_STATIONS = 16;
export const MAX_SEARCH_DAYS = 400;

const FIRST_YEAR = 1970;
const LAST_YEAR = 2100;

export const instantSchema = z.iso
  .datetime('Give the instant in UTC as 2027-01-20T22:00:00Z.')
  .transform((text) => Date.parse(text))
  .refine((timeMs) => timeMs >= Date.UTC(FIRST_YEAR, 0) && timeMs < Date.UTC(LAST_YEAR, 0), {
    error: `Instants from ${FIRST_YEAR} to ${LAST_YEAR - 1} can be computed.`,
  });

export const frequencySchema = figure(
  'The frequency',
  LOWEST_FREQUENCY_MHZ,
  HIGHEST_FREQUENCY_MHZ,
  'MHz',
);

export const modeSchema = z.enum(MODE_IDS, `The mode must be one of ${MODE_IDS.join(', ')}.`);

/** Limits counted once for every station and day: about two seconds of computing. */
const MAX_STATION_DAY_LIMITS = 1_500_000;

function limitsIn(sky: SkyLimits | undefined): number {
  return 20 + (sky?.horizon?.length ?? 0) + 4 * (sky?.blocked?.length ?? 0);
}

/** A label, not only an issued call sign: portable and planned stations are searched for too. */
export const callSignSchema = z
  .string('A call sign is needed.')
  .trim()
  .min(1, 'A call sign is needed.')
  .max(20, 'A call sign has at most 20 characters.')
  .regex(/^[A-Za-z0-9/-]*$/, 'A call sign has only letters A to Z, digits, slashes and hyphens.');

export const moonRequestSchema = record(
  {
    site: siteSchema,
    times: z
      .array(instantSchema, 'Give the instants as a list.')
      .min(1, 'Give at least one instant.')
      .max(MAX_TIMES, `At most ${MAX_TIMES} instants can be given at once.`),
    frequencyMhz: frequencySchema.optional(),
  },
  'The request',
);
export type MoonRequest = z.output<typeof moonRequestSchema>;

const searchStationSchema = record(
  {
    callSign: callSignSchema,
    site: siteSchema,
    sky: calculatorSkySchema.optional(),
    setup: setupSchema.optional(),
  },
  'A station',
);

export const windowsRequestSchema = record(
  {
    stations: z
      .array(searchStationSchema, 'Give the stations as a list.')
      .min(2, 'Give at least two stations.')
      .max(MAX_STATIONS, `At most ${MAX_STATIONS} stations can be searched together.`),
    from: instantSchema,
    to: instantSchema.describe(`At most ${MAX_SEARCH_DAYS} days after from.`),
    frequencyMhz: frequencySchema.optional(),
    mode: modeSchema.optional(),
    minimumMinutes: figure('The least length', 0, 1440, 'minutes')
      .describe('Absent: 1.')
      .optional(),
    maximumDegradationDb: figure('The highest degradation', 0, 60, 'dB').optional(),
    minimumSunSeparationDeg: figure('The least distance from the Sun', 0, 180, '°').optional(),
    minimumMarginDb: figure('The least margin', -100, 100, 'dB').optional(),
    refraction: z
      .boolean('Refraction is true or false.')
      .describe('Compare refracted elevations instead of airless ones.')
      .optional(),
  },
  'The request',
).superRefine((search, context) => {
  const problem = (path: (string | number)[], message: string) =>
    context.addIssue({ code: 'custom', path, message });
  if (search.to <= search.from) {
    problem(['to'], 'The search must end after it begins.');
  } else if (search.to - search.from > MAX_SEARCH_DAYS * DAY_MS) {
    problem(['to'], `A search covers at most ${MAX_SEARCH_DAYS} days.`);
  }
  if (search.maximumDegradationDb !== undefined && search.frequencyMhz === undefined) {
    problem(['maximumDegradationDb'], 'Degradation depends on the band: give frequencyMhz too.');
  }
  if (search.minimumMarginDb !== undefined) {
    const needed = 'A margin needs frequencyMhz, mode and the setup of every station';
    if (search.frequencyMhz === undefined)
      problem(['frequencyMhz'], `${needed}; frequencyMhz is missing.`);
    if (search.mode === undefined) problem(['mode'], `${needed}; mode is missing.`);
    search.stations.forEach(({ callSign, setup }, index) => {
      if (setup) return;
      problem(['stations', index, 'setup'], `${needed}; ${callSign} has none.`);
    });
  }
  const days = (search.to - search.from) / DAY_MS;
  const work = search.stations.reduce((sum, { sky }) => sum + days * limitsIn(sky), 0);
  if (work > MAX_STATION_DAY_LIMITS) {
    const message =
      'So many limits over so many days are too much for one request. Shorten the dates or simplify the skies.';
    problem(['to'], message);
  }
  const known = new Set<string>();
  search.stations.forEach(({ callSign }, index) => {
    const key = callSign.toUpperCase();
    if (known.has(key)) {
      problem(['stations', index, 'callSign'], `The call sign ${callSign} stands twice.`);
    }
    known.add(key);
  });
});
export type WindowsRequest = z.output<typeof windowsRequestSchema>;
