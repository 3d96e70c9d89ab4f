import { newId, newSecret } from '../../../../src/server/ids';
import { acceptSked } from '../../../../src/server/skeds/acceptSked';
import { cancelSked } from '../../../../src/server/skeds/cancelSked';
import { declineSked } from '../../../../src/server/skeds/declineSked';
import { dropOutSked } from '../../../../src/server/skeds/dropOutSked';
import { reportSked } from '../../../../src/server/skeds/reportSked';
import { withdrawSked } from '../../../../src/server/skeds/withdrawSked';
import { joinCrew } from '../../../../src/server/stations/joinCrew';
import type { Viewer } from '../../../../src/server/auth/viewer';
import { readEntry, takeIn, type Calendars, type Entry } from '../calendarProgram';
import { addPerson, newWorld, type World } from '../world';
import type { Act } from './model';

export const FLOATERS = ['Floater', 'Drifter'];

/** The application on a database of its own, and what was seen of it so far. */
export interface Real {
  world: World;
  /** Floating members of crews, by name. */
  people: Record<string, Viewer>;
  /** In the order of the model's skeds. */
  ids: string[];
  uids: Map<string, string>;
  sequences: Map<string, number>;
  calendars: Calendars;
  /** Every message so far. */
  messages: { recipient: string; entry: Entry }[];
  read: number;
}

export async function newReal(): Promise<Real> {
  const world = await newWorld();
  const people: Record<string, Viewer> = {};
  for (const name of FLOATERS) people[name] = await addPerson(world.services, name, 'UTC');
  return {
    world,
    people,
    ids: [],
    uids: new Map(),
    sequences: new Map(),
    calendars: new Map(),
    messages: [],
    read: 0,
  };
}

/** Lets every person's calendar program take in the mails that have come since. */
export async function readMails(real: Real): Promise<void> {
  const mails = await real.world.services.db
    .selectFrom('outbox')
    .selectAll()
    .orderBy('rowid' as 'id')
    .offset(real.read)
    .limit(10_000)
    .execute();
  real.read += mails.length;
  for (const { recipient, calendar_body: body } of mails) {
    if (body === null) continue;
    const entry = readEntry(body);
    real.messages.push({ recipient, entry });
    takeIn(real.calendars, recipient, entry);
  }
}

export async function act(
  { world }: Real,
  skedId: string,
  kind: Act,
  by: string,
  version: number,
): Promise<void> {
  const viewer = world.people[by]!;
  const input = { version, words: '' };
  const cases = {
    accept: () => acceptSked(world.services, viewer, skedId, input),
    decline: () => declineSked(world.services, viewer, skedId, input),
    dropOut: () => dropOutSked(world.services, viewer, skedId, input),
    withdraw: () => withdrawSked(world.services, viewer, skedId, input),
    cancel: () => cancelSked(world.services, viewer, skedId, input),
    report: () => reportSked(world.services, viewer, skedId, { ...input, result: 'completed' }),
  };
  await cases[kind]();
}

/** Joins a crew as people do: with an invitation. */
export async function join({ world }: Real, person: Viewer, callSign: string): Promise<void> {
  const { secret, hash } = newSecret();
  await world.services.db
    .insertInto('crew_invitation')
    .values({
      id: newId(),
      station_id: world.stationIds[callSign]!,
      email: person.email,
      crew_role: 'operator',
      token_hash: hash,
      invited_by: world.people[callSign]!.id,
      created_at: world.clock.nowMs,
      expires_at: world.clock.nowMs + 1,
      accepted_at: null,
    })
    .execute();
  await joinCrew(world.services, person, secret);
}
