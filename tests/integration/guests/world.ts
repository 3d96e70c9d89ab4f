import { sql } from 'kysely';
import type { Interval } from '~/domain/time/interval';
import type { OutboxRow } from '~/server/db/tables';
import { guestSchema } from '~/server/guests/guestSchema';
import { offerSked } from '~/server/skeds/offerSked';
import type { World } from '../skeds/world';

export const GUEST = {
  callSign: 'QZ9NEW',
  email: 'bea@qz9new.example',
  locator: 'JO40aa',
};

/** An offer of QA1LUN to somebody without an account. */
export function offerToGuest(
  world: World,
  slot: Interval,
  guest: Record<string, unknown> = {},
  words = '',
  from = 'QA1LUN',
) {
  return offerSked(world.services, world.people[from]!, {
    station: world.stationIds[from]!,
    with: [guestSchema.parse({ ...GUEST, ...guest })],
    band: '1296',
    mode: 'q65-60c',
    start: slot.startMs,
    end: slot.endMs,
    words,
  });
}

export async function mailsTo(world: World, address: string): Promise<OutboxRow[]> {
  return world.services.db
    .selectFrom('outbox')
    .selectAll()
    .where('recipient', '=', address)
    .orderBy(sql`rowid`)
    .execute();
}

/** The secret of the link in a mail. */
export function secretOf(mail: OutboxRow): string {
  const found = /\/answer\/([\w-]+)/.exec(mail.text_body)?.[1];
  if (!found) throw new Error(`No link in “${mail.subject}”:\n${mail.text_body}`);
  return found;
}

/** Everything in the tables that an answer could change. */
export async function everything({ services: { db } }: World): Promise<unknown> {
  return {
    skeds: await db.selectFrom('sked').selectAll().orderBy('id').execute(),
    parties: await db.selectFrom('sked_party').selectAll().orderBy('sked_id').execute(),
    events: await db.selectFrom('sked_event').selectAll().orderBy('id').execute(),
    links: await db.selectFrom('guest_link').selectAll().orderBy('id').execute(),
    outbox: await db.selectFrom('outbox').select('id').orderBy('id').execute(),
    people: await db.selectFrom('person').selectAll().orderBy('id').execute(),
    stations: await db.selectFrom('station').selectAll().orderBy('id').execute(),
  };
}
