import { z } from 'zod';
import { weekendSentence } from '../../domain/outlook/sentences';
import { utcDate } from '../../domain/window/question';
import type { Viewer } from '../auth/viewer';
import { InvalidInput } from '../errors';
import type { Services } from '../services';
import { rounded } from '../windows/figures';
import { outlookPage } from './outlookPage';

const END = 'A region, the call sign of a listed station, or a locator.';

/** For the description of the API; what cannot be read is refused by the use case in words. */
export const outlookQuerySchema = z.object({
  here: z.string().describe(END).optional(),
  there: z.string().describe(END).optional(),
  band: z.string().describe('144, 432, 1296 …; default 144.').optional(),
  from: z.string().describe('First day, UTC, as 2027-01-20; default today.').optional(),
});

const number = z.number();

const daySchema = z.object({
  date: z.iso.date().describe('UTC.'),
  distanceKm: number.describe('Centre to centre, at noon UTC.'),
  declinationDeg: number.describe('Geocentric, at noon UTC.'),
  sunSeparationDeg: number.describe('Seen from the centre of the Earth, at noon UTC.'),
  degradationDb: number.describe(
    'At noon UTC, against the least distance and the coldest sky of the path.',
  ),
  commonHours: number.describe('Of the whole UTC day; for regions the mean over all pairs.'),
});

export const outlookAnswerSchema = z.object({
  here: z.string(),
  there: z.string(),
  weekends: z
    .array(
      z.object({
        saturday: z.iso.date(),
        degradationDb: number,
        commonHours: number,
        sunSeparationDeg: number,
        reason: z.string(),
      }),
    )
    .describe('The best twelve, best first.'),
  days: z.array(daySchema),
});
export type OutlookAnswer = z.output<typeof outlookAnswerSchema>;

/** The year ahead as JSON. Throws `InvalidInput` with a sentence for everything that cannot be read. */
export async function outlookAnswer(
  services: Services,
  viewer: Pick<Viewer, 'id'> | null,
  params: URLSearchParams,
): Promise<OutlookAnswer> {
  const { problems, year } = await outlookPage(services, viewer, params);
  if (problems.length > 0 || !year) throw new InvalidInput(problems.join(' '));
  return {
    here: year.here.name,
    there: year.there.name,
    weekends: year.best.map((weekend) => ({
      saturday: utcDate(weekend.saturday.startMs),
      degradationDb: rounded(weekend.degradationDb, 2),
      commonHours: rounded(weekend.commonHours, 2),
      sunSeparationDeg: rounded(weekend.sunSeparationDeg, 2),
      reason: weekendSentence(weekend, year.days),
    })),
    days: year.days.map((day) => ({
      date: utcDate(day.startMs),
      distanceKm: rounded(day.distanceKm, 0),
      declinationDeg: rounded(day.declinationDeg, 2),
      sunSeparationDeg: rounded(day.sunSeparationDeg, 2),
      degradationDb: rounded(day.degradationDb, 2),
      commonHours: rounded(day.commonHours, 3),
    })),
  };
}
