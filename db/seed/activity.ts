import { activitySettingsSchema, nestedFields } from '../../src/domain/activity/settings';
import type { BandId } from '../../src/domain/station/bands';
import { DAY_MS, HOUR_MS } from '../../src/domain/time/interval';
import { createActivity } from '../../src/server/activities/createActivity';
import { guestInvitationSchema, inviteGuest } from '../../src/server/activities/inviteGuest';
import { inviteStation } from '../../src/server/activities/inviteStation';
import { saveAnswer } from '../../src/server/activities/saveAnswer';
import type { Services } from '../../src/server/services';
import { keeperOf, type Roster } from './roster';

/** What a station of the demo answers; times of day in UTC hours of the weekend, 0 … 47. */
interface DemoAnswer {
  callSign: string;
  bands: BandId[];
  answer?: 'coming' | 'notComing';
  hours?: [from: number, to: number][];
  most?: number;
  /** Only these, each with its priority. */
  list?: Record<string, '1' | '2' | '3'>;
  /** Beside everyone. */
  mostWanted?: string[];
  never?: string[];
  note?: string;
}

const BOTH: BandId[] = ['432', '1296'];

const ANSWERS: readonly DemoAnswer[] = [
  { callSign: 'QA1LUN', bands: BOTH, most: 9, mostWanted: ['QB7TID', 'QJ4NIM'] },
  { callSign: 'QB7TID', bands: BOTH, most: 8, mostWanted: ['QA1LUN'] },
  { callSign: 'QK3OSL', bands: BOTH, note: 'Two operators, so both nights are fine.' },
  { callSign: 'QE4MOR', bands: ['1296'], list: { QL1RIC: '3', QJ4NIM: '3', QB7TID: '2' } },
  { callSign: 'QG8PEL', bands: BOTH, most: 6 },
  { callSign: 'QI2CED', bands: BOTH, mostWanted: ['QR5KEL'] },
  { callSign: 'QV3HAL', bands: BOTH, most: 5 },
  { callSign: 'QY1FEN', bands: ['1296'] },
  { callSign: 'QN9WEX', bands: BOTH },
  { callSign: 'QD5ALD', bands: BOTH, never: ['QR5KEL'] },
  { callSign: 'QR5KEL', bands: BOTH },
  { callSign: 'QL1RIC', bands: BOTH, most: 6 },
  {
    callSign: 'QJ4NIM',
    bands: BOTH,
    hours: [
      [0, 14],
      [20, 38],
    ],
  },
  { callSign: 'QP4STE', bands: [], answer: 'notComing', note: 'The mast is down for painting.' },
];

const GUESTS = [
  { callSign: 'QB2MUR', email: 'murka@qb2mur.example', locator: 'KO26', bands: ['1296'] },
  { callSign: 'QX7ARN', email: 'arno@qx7arn.example', locator: 'EM17', bands: ['432'] },
] as const;

/** The Saturday that begins the coming weekend; from Thursday on the next one, so that it lies ahead. */
export function demoWeekendMs(nowMs: number): number {
  const midnightMs = Math.floor(nowMs / DAY_MS) * DAY_MS;
  const untilSaturday = (6 - new Date(midnightMs).getUTCDay() + 7) % 7;
  return midnightMs + (untilSaturday < 3 ? untilSaturday + 7 : untilSaturday) * DAY_MS;
}

/** An activity of the demo's coordinator on the coming weekend, with most answers in. */
export async function loadActivity(services: Services, roster: Roster): Promise<void> {
  const nowMs = services.now();
  const startMs = demoWeekendMs(nowMs);
  const at = (days: number): Services => ({ ...services, now: () => nowMs - days * DAY_MS });
  const marit = roster.people.get('marit')!;
  const day = (ms: number) => new Date(ms).toISOString().slice(0, 10);
  const { slug } = await createActivity(
    at(18),
    marit,
    activitySettingsSchema.parse(
      nestedFields({
        title: 'Two tides weekend',
        'start.day': day(startMs),
        'start.clock': '00:00',
        'end.day': day(startMs + 2 * DAY_MS),
        'end.clock': '00:00',
        'bands.432.on': 'yes',
        'bands.432.mode': 'q65-60b',
        'bands.1296.on': 'yes',
        'bands.1296.mode': 'q65-60c',
        slotMinutes: '30',
        gridMinutes: '30',
        bandChangeMinutes: '30',
        mostInARow: '4',
        leastPauseMinutes: '30',
        'weights.favour': 'both',
        'weights.spread': 'somewhat',
        'weights.leastChance': '0.05',
        'weights.leastElevationDeg': '0',
        invitation:
          'Two days on 432 and 1296 MHz, half an hour for each contact.\n\nSay when you are there and whom you want; the plan comes by mail.',
        notes: 'Listen for the others between your slots, and report what you heard.',
        'answersBy.day': day(startMs - DAY_MS),
        'answersBy.clock': '00:00',
      }),
    ),
  );
  for (const { callSign } of ANSWERS) {
    await inviteStation(at(17), marit, slug, roster.stationIds.get(callSign)!);
  }
  for (const guest of GUESTS) {
    const bands = Object.fromEntries(guest.bands.map((band) => [band, 'yes']));
    await inviteGuest(at(16), marit, slug, guestInvitationSchema.parse({ ...guest, bands }));
  }
  for (const [index, answer] of ANSWERS.entries()) {
    const when = { ...services, now: () => nowMs - 15 * DAY_MS + index * 7 * HOUR_MS };
    const keeper = roster.people.get(keeperOf(answer.callSign).key)!;
    const stationId = roster.stationIds.get(answer.callSign)!;
    await saveAnswer(when, keeper, slug, stationId, formOf(answer, roster));
  }
}

/** The answer as the form sends it. */
function formOf(given: DemoAnswer, { stationIds }: Roster): Record<string, string> {
  const wish = (callSign: string, choice: string) => [`wish.${stationIds.get(callSign)!}`, choice];
  const hours = (given.hours ?? []).flatMap(([from, to]) =>
    Array.from({ length: to - from }, (_, hour) => [`hour.${from + hour}`, 'yes']),
  );
  return Object.fromEntries([
    ['answer', given.answer ?? 'coming'],
    ...given.bands.map((band) => [`bands.${band}`, 'yes']),
    ['when', given.hours ? 'these' : 'usual'],
    ...hours,
    ['mostContacts', given.most ? String(given.most) : ''],
    ['wants', given.list ? 'list' : 'everyone'],
    ['priority', '2'],
    ...Object.entries(given.list ?? {}).map(([callSign, priority]) => wish(callSign, priority)),
    ...(given.mostWanted ?? []).map((callSign) => wish(callSign, '3')),
    ...(given.never ?? []).map((callSign) => wish(callSign, 'never')),
    ['note', given.note ?? ''],
  ]) as Record<string, string>;
}
