import type { Interval } from '../../src/domain/time/interval';
import type { Db } from '../../src/server/db/connection';
import type { SkedEventRow, SkedPartyRow, SkedRow } from '../../src/server/db/tables';
import type { Tx } from '../../src/server/db/transaction';

/** A sked as the use cases left it, to be written again with other times. */
export interface Pattern {
  sked: SkedRow;
  parties: SkedPartyRow[];
  events: SkedEventRow[];
}

export async function patternOf(db: Db, id: string): Promise<Pattern> {
  return {
    sked: await db.selectFrom('sked').selectAll().where('id', '=', id).executeTakeFirstOrThrow(),
    parties: await db.selectFrom('sked_party').selectAll().where('sked_id', '=', id).execute(),
    events: await db.selectFrom('sked_event').selectAll().where('sked_id', '=', id).execute(),
  };
}

export async function copySked(tx: Tx, pattern: Pattern, id: string, slot: Interval) {
  const times = { start_at: slot.startMs, end_at: slot.endMs };
  const uid = `${id}@race.example`;
  await tx
    .insertInto('sked')
    .values({ ...pattern.sked, ...times, id, uid })
    .execute();
  await tx
    .insertInto('sked_party')
    .values(pattern.parties.map((party) => ({ ...party, sked_id: id })))
    .execute();
  await tx
    .insertInto('sked_event')
    .values(
      pattern.events.map((event, n) => ({ ...event, ...times, id: `${id}-${n}`, sked_id: id })),
    )
    .execute();
}

export async function removeSked(db: Db, id: string): Promise<void> {
  await db.deleteFrom('sked').where('id', '=', id).execute();
}
