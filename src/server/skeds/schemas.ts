import { z } from 'zod';
import { BAND_IDS } from '../../domain/station/bands';
import { MODE_IDS } from '../../domain/station/modes';
import { clockOfDay } from '../../domain/sked/moveChoice';
import { LONGEST_REPORT } from '../../domain/sked/result';
import { plainWords } from '../../domain/sked/talk';
import { MINUTE_MS } from '../../domain/time/interval';
import type { Tx } from '../db/transaction';
import { guestSchema, type Guest } from '../guests/guestSchema';

/** What people may add to an offer or an answer. */
export const wordsSchema = z
  .string('The words must be text.')
  .max(500, 'Keep the words under 500 characters.')
  .transform((text) => text.trim())
  .default('');

const instant = z.iso
  .datetime({ error: 'Give the time as 2027-01-20T22:00:00Z.' })
  .transform((text) => Date.parse(text));

export const stationIdSchema = z
  .string('Name the station by its id.')
  .min(1, 'Name the station by its id.')
  .max(64, 'That is not the id of a station.');

/** On which version a change is based, and on whose behalf (by default the viewer's own station). */
export const skedAnswerSchema = z.object({
  version: z.coerce
    .number('Say which version of the sked you saw.')
    .int('Say which version of the sked you saw.')
    .min(1, 'Say which version of the sked you saw.'),
  as: stationIdSchema.optional(),
  words: wordsSchema,
});
export type SkedAnswer = z.output<typeof skedAnswerSchema> & WithLink;

/** What comes first in the transaction of a change made behind a link: using the link up. */
export interface WithLink {
  first?: ((tx: Tx) => Promise<void>) | undefined;
}

export const skedMoveSchema = skedAnswerSchema.extend({ start: instant, end: instant });

/** The form of a move: date and clock in UTC and a length, or a ready slot. */
export const skedMoveFormSchema = skedAnswerSchema
  .extend({
    id: z.string().min(1).max(64),
    date: z.string().default(''),
    time: z.string().default(''),
    minutes: z.string().default(''),
    start: z.string().optional(),
    end: z.string().optional(),
  })
  .transform(({ date, time, minutes, start, end, ...answer }, context) => {
    if (start && end) {
      const slot = { start: Date.parse(start), end: Date.parse(end) };
      if (Number.isFinite(slot.start) && Number.isFinite(slot.end)) return { ...answer, ...slot };
    }
    const problem = (path: string, message: string) =>
      context.addIssue({ code: 'custom', path: [path], message });
    const dayMs = /^\d{4}-\d{2}-\d{2}$/.test(date) ? Date.parse(`${date}T00:00:00Z`) : NaN;
    if (Number.isNaN(dayMs)) problem('date', 'Give the day as 2027-01-20.');
    const clockMs = clockOfDay(time);
    if (clockMs === null) problem('time', 'Give the start as 22:00, in UTC.');
    const length = /^\d{1,4}$/.test(minutes.trim()) ? Number(minutes) : NaN;
    if (Number.isNaN(length)) problem('minutes', 'Give the length in whole minutes, such as 45.');
    if (Number.isNaN(dayMs) || clockMs === null || Number.isNaN(length)) return z.NEVER;
    const startMs = dayMs + clockMs;
    return { ...answer, start: startMs, end: startMs + length * MINUTE_MS };
  });

const signalReport = z
  .string('The report must be text, such as −21 or 529.')
  .transform((text) => plainWords(text).replace(/\s+/g, ' '))
  .refine(
    (text) => [...text].length <= LONGEST_REPORT,
    `Keep the report to ${LONGEST_REPORT} characters.`,
  )
  .default('');

export const skedReportSchema = skedAnswerSchema.extend({
  result: z.enum(['completed', 'partly', 'notHeard'], 'Say completed, partly or not heard.'),
  reportSent: signalReport,
  reportReceived: signalReport,
});

/** A registered station by its id, or somebody without an account. Problems are told of the one that was meant. */
const partnerSchema = z.unknown().transform((given, context): string | Guest => {
  const meant = typeof given === 'object' && given !== null ? guestSchema : stationIdSchema;
  const parsed = meant.safeParse(given);
  if (parsed.success) return parsed.data;
  for (const { path, message } of parsed.error.issues) {
    context.addIssue({ code: 'custom', path, message });
  }
  return z.NEVER;
});

export const skedOfferSchema = z.object({
  station: stationIdSchema,
  with: z
    .array(partnerSchema, 'Name at least one partner station.')
    .min(1, 'Name at least one partner station.')
    .max(15, 'A sked takes at most 16 stations.'),
  band: z.enum(BAND_IDS, 'Choose one of the bands.'),
  frequencyMhz: z.number('The frequency is a number in MHz.').optional(),
  mode: z.enum(MODE_IDS, 'Choose one of the modes.'),
  start: instant,
  end: instant,
  words: wordsSchema,
});
