import ICAL from 'ical.js';
import type { BandSetup } from '~/domain/station/setup';
import { MINUTE_MS, type Interval } from '~/domain/time/interval';
import { askForPlan } from '~/server/activities/askForPlan';
import { inviteGuest } from '~/server/activities/inviteGuest';
import { inviteStation } from '~/server/activities/inviteStation';
import { loadRevision, type LoadedRevision } from '~/server/activities/revisions';
import { saveAnswer } from '~/server/activities/saveAnswer';
import { timetableData } from '~/server/activities/timetableData';
import { workPlanRuns } from '~/server/activities/workPlanRuns';
import { addPerson, giveBand, joinCrew } from '../skeds/world';
import { answerForm, begin, newActivityWorld, type ActivityWorld } from './world';

export interface PlanWorld extends ActivityWorld {
  activityId: string;
  slug: string;
}

/** A station that most others can work on 1296 MHz. */
const STRONG: BandSetup = {
  antenna: { kind: 'dish', diameterM: 4.5, apertureEfficiency: 0.55 },
  polarization: 'rightCircular',
  powerAtFeedW: 300,
  receive: { kind: 'measured', systemTemperatureK: 60 },
};

const MORE = {
  QD4NOR: { site: [60.1, 5.3], zone: 'Europe/Oslo', keeper: 'Dagny' },
  QE5SUD: { site: [41.2, 14.7], zone: 'Europe/Rome', keeper: 'Elio' },
} as const;

export const REGISTERED = ['QA1LUN', 'QB7TID', 'QC2FAR', 'QD4NOR', 'QE5SUD'] as const;
export const GUEST_MAIL = 'arno@qx7arn.example';

/** An activity with five registered stations and a guest, all coming on 1296 MHz and wanting everyone. */
export async function newPlanWorld(changes: Record<string, string> = {}): Promise<PlanWorld> {
  const world = await newActivityWorld();
  const { services, marit } = world;
  for (const [callSign, one] of Object.entries(MORE)) await addStation(world, callSign, one);
  const { id: activityId, slug } = await begin(world, {
    'bands.1296.mode': 'q65-60c',
    slotMinutes: '30',
    ...changes,
  });
  for (const callSign of REGISTERED) {
    await giveBand(world, callSign, STRONG);
    const stationId = world.stationIds[callSign]!;
    await inviteStation(services, marit, slug, stationId);
    await saveAnswer(services, world.people[callSign]!, slug, stationId, answerForm());
  }
  await inviteGuest(services, marit, slug, {
    callSign: 'QX7ARN',
    email: GUEST_MAIL,
    locator: 'JN58',
    bands: { '1296': 'yes' },
  });
  const guest = await services.db
    .selectFrom('station')
    .select('id')
    .where('call_sign', '=', 'QX7ARN')
    .executeTakeFirstOrThrow();
  world.stationIds['QX7ARN'] = guest.id;
  await saveAnswer(services, marit, slug, guest.id, answerForm());
  return { ...world, activityId, slug };
}

interface NewStation {
  site: readonly [latitudeDeg: number, longitudeDeg: number];
  zone: string;
  keeper: string;
}

async function addStation(
  world: ActivityWorld,
  callSign: string,
  { site, zone, keeper }: NewStation,
): Promise<void> {
  const { services } = world;
  const person = await addPerson(services, keeper, zone);
  const id = `station-${callSign.toLowerCase()}`;
  const like = await services.db
    .selectFrom('station')
    .selectAll()
    .where('call_sign', '=', 'QA1LUN')
    .executeTakeFirstOrThrow();
  await services.db
    .insertInto('station')
    .values({
      ...like,
      id,
      call_sign: callSign,
      name: callSign,
      latitude_deg: site[0],
      longitude_deg: site[1],
      time_zone: zone,
      hours_json: JSON.stringify({ timeZone: zone, weekly: null, daysOff: [] }),
    })
    .execute();
  await joinCrew(services, id, person);
  world.people[callSign] = person;
  world.stationIds[callSign] = id;
}

/** So many more stations around the same few longitudes, so that a plan takes the solver a while. */
export async function crowd(world: PlanWorld, count: number): Promise<void> {
  const { services, marit, slug } = world;
  for (let index = 0; index < count; index += 1) {
    const letters = String.fromCharCode(65 + (index % 26), 65 + Math.floor(index / 26));
    const callSign = `QZ${index % 10}${letters}X`;
    await addStation(world, callSign, {
      site: [42 + (index % 7) * 2.5, 2 + (index % 5) * 4],
      zone: 'Europe/Berlin',
      keeper: `Keeper ${letters}`,
    });
    await giveBand(world, callSign, STRONG);
    const stationId = world.stationIds[callSign]!;
    await inviteStation(services, marit, slug, stationId);
    await saveAnswer(services, marit, slug, stationId, answerForm());
  }
}

/** Asks for a plan and computes it in the solver's own thread. */
export async function plan(
  world: PlanWorld,
  how: 'anew' | 'around' = 'anew',
): Promise<LoadedRevision> {
  await askForPlan(world.services, world.marit, world.slug, { how });
  if (!(await workPlanRuns(world.services))) throw new Error('There was no run to work on.');
  return draftOf(world);
}

export async function draftOf(world: PlanWorld): Promise<LoadedRevision> {
  const draft = await loadRevision(world.services.db, world.activityId, 'draft');
  if (!draft) throw new Error('There is no draft.');
  return draft;
}

export function timetable(world: PlanWorld) {
  return timetableData(world.services, world.marit, world.slug);
}

/** A sked that somebody agreed beside the plan. */
export async function bookElsewhere(
  world: PlanWorld,
  callSigns: readonly string[],
  slot: Interval,
): Promise<void> {
  const id = `elsewhere-${slot.startMs}-${callSigns.join('-')}`;
  const { db } = world.services;
  const like = { band: '1296', frequency_mhz: 1296.1, mode: 'q65-60c' } as const;
  await db
    .insertInto('sked')
    .values({
      ...like,
      id,
      uid: `${id}@elsewhere.example`,
      state: 'agreed',
      version: 1,
      agreed_version: 1,
      offered_by: world.stationIds[callSigns[0]!]!,
      start_at: slot.startMs,
      end_at: slot.endMs,
      created_at: world.clock.nowMs,
      updated_at: world.clock.nowMs,
    })
    .execute();
  for (const callSign of callSigns) {
    await db
      .insertInto('booking')
      .values({
        station_id: world.stationIds[callSign]!,
        sked_id: id,
        start_at: slot.startMs,
        end_at: slot.endMs,
      })
      .execute();
  }
}

/** Mails that were put into the outbox since the mark was taken. */
export async function mailMark(world: PlanWorld) {
  const known = new Set((await world.mails()).map(({ id }) => id));
  return async () => (await world.mails()).filter(({ id }) => !known.has(id));
}

export interface PublishedEntry {
  uid: string;
  sequence: number;
  status: string;
  startMs: number;
  minutes: number;
  attendees: number;
}

/** A calendar with many entries as another library reads it. */
export function readCalendar(body: string): { method: string; entries: PublishedEntry[] } {
  const calendar = new ICAL.Component(ICAL.parse(body) as unknown[]);
  return {
    method: String(calendar.getFirstPropertyValue('method')),
    entries: calendar.getAllSubcomponents('vevent').map((component) => {
      const event = new ICAL.Event(component);
      const startMs = event.startDate.toJSDate().getTime();
      return {
        uid: event.uid,
        sequence: event.sequence,
        status: String(component.getFirstPropertyValue('status')),
        startMs,
        minutes: (event.endDate.toJSDate().getTime() - startMs) / MINUTE_MS,
        attendees: component.getAllProperties('attendee').length,
      };
    }),
  };
}
