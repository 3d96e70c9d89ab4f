import { z } from 'zod';
import type { WeeklyHours, WeeklyStretch } from '../time/weeklyHours';
import { record } from './fields';

const fromSchema = z
  .string({ error: 'From is missing.' })
  .regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'From must be a time such as 18:00.');
const toSchema = z
  .string({ error: 'To is missing.' })
  .regex(/^(([01]\d|2[0-3]):[0-5]\d|24:00)$/, 'To must be a time such as 23:30, at most 24:00.');

const stretchSchema: z.ZodType<WeeklyStretch> = record({
  weekday: z.literal([1, 2, 3, 4, 5, 6, 7], {
    error: 'The weekday must be a number from 1 (Monday) to 7 (Sunday).',
  }),
  from: fromSchema,
  to: toSchema,
});

const dateSchema = z
  .string({ error: 'A day off must be a date.' })
  .refine(isCalendarDate, 'A day off must be a date that exists, such as 2027-02-13.');

function isCalendarDate(text: string): boolean {
  if (!/^\d{4}-\d{2}-\d{2}$/.test(text)) return false;
  const at = new Date(`${text}T00:00:00Z`);
  return !Number.isNaN(at.getTime()) && at.toISOString().startsWith(text);
}

/** Usable hours without their zone, which is the station's. */
export type StationHours = Omit<WeeklyHours, 'timeZone'>;

/** `weekly` null is always, an empty list is never. Days off are sorted and each kept once. */
export const stationHoursSchema = record({
  weekly: z
    .array(stretchSchema, { error: 'Weekly hours must be a list, or nothing for all hours.' })
    .max(70, 'At most 70 stretches a week are kept.')
    .nullable(),
  daysOff: z
    .array(dateSchema, { error: 'Days off must be a list of dates.' })
    .max(400, 'At most 400 days off are kept.')
    .transform((dates) => [...new Set(dates)].sort()),
});
