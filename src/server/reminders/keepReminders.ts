import type { Db } from '../db/connection';
import { listed } from '../db/listed';
import { inTransaction, type Tx } from '../db/transaction';
import { newId } from '../ids';
import type { Services } from '../services';
import { keyText, keyTextOfRow, wantedReminders, type WantedReminder } from './wantedReminders';

const SKEDS_AT_ONCE = 50;

interface Difference {
  missing: WantedReminder[];
  /** Ids of rows that nobody waits for any more, and their skeds. */
  surplus: { id: string; sked_id: string }[];
}

/**
 * Makes the rows of the reminders what follows from skeds, crews and wishes: adds those that are missing, takes away
 * those that are not wanted any more and have not been queued. Looks without a lock, then looks again at the skeds
 * concerned in a transaction. Returns how many rows changed; run twice, the second changes nothing.
 */
export async function keepReminders(services: Services): Promise<number> {
  const seen = await difference(services.db, services.now());
  const skedIds = [
    ...new Set([
      ...seen.missing.map((reminder) => reminder.skedId),
      ...seen.surplus.map((row) => row.sked_id),
    ]),
  ];
  let changed = 0;
  for (let from = 0; from < skedIds.length; from += SKEDS_AT_ONCE) {
    const some = skedIds.slice(from, from + SKEDS_AT_ONCE);
    changed += await inTransaction(services.db, (tx) => keepRemindersOf(tx, services, some));
  }
  return changed;
}

/** The same for some skeds, within the caller's transaction. */
export async function keepRemindersOf(
  tx: Tx,
  services: Pick<Services, 'now'>,
  skedIds: readonly string[],
): Promise<number> {
  const { missing, surplus } = await difference(tx, services.now(), skedIds);
  await tx
    .deleteFrom('reminder')
    .where('id', 'in', (ids) => ids.selectFrom(listed(surplus.map(({ id }) => id))).select('value'))
    .execute();
  for (const reminder of missing) {
    await tx
      .insertInto('reminder')
      .values({
        id: newId(),
        sked_id: reminder.skedId,
        person_id: reminder.personId,
        kind: reminder.kind,
        minutes: reminder.minutes,
        agreed_version: reminder.agreedVersion,
        due_at: reminder.dueMs,
        queued_at: null,
        dropped_at: null,
      })
      .execute();
  }
  return surplus.length + missing.length;
}

/** The same for every sked of a person, before the person's wishes or crews change. */
export async function keepRemindersOfPerson(
  tx: Tx,
  services: Pick<Services, 'now'>,
  personId: string,
): Promise<void> {
  const rows = await tx
    .selectFrom('sked_party')
    .innerJoin('station_crew', 'station_crew.station_id', 'sked_party.station_id')
    .innerJoin('sked', 'sked.id', 'sked_party.sked_id')
    .select('sked.id')
    .distinct()
    .where('station_crew.person_id', '=', personId)
    .where('sked.agreed_version', 'is not', null)
    .where('sked.end_at', '>', services.now() - 7 * 86_400_000)
    .execute();
  await keepRemindersOf(
    tx,
    services,
    rows.map((row) => row.id),
  );
}

async function difference(
  db: Db | Tx,
  nowMs: number,
  only?: readonly string[],
): Promise<Difference> {
  const wanted = await wantedReminders(db, nowMs, only);
  const rows = await existing(db, only ?? wanted.map((reminder) => reminder.skedId), only);
  const wantedKeys = new Set(wanted.map(keyText));
  const known = new Set(rows.map(keyTextOfRow));
  return {
    missing: wanted.filter(
      (reminder) => reminder.dueMs > reminder.sinceMs && !known.has(keyText(reminder)),
    ),
    surplus: rows.filter(
      (row) =>
        row.queued_at === null && row.dropped_at === null && !wantedKeys.has(keyTextOfRow(row)),
    ),
  };
}

/** Rows of these skeds, and without a limit to some skeds every row that still waits. */
function existing(db: Db | Tx, skedIds: readonly string[], only?: readonly string[]) {
  return db
    .selectFrom('reminder')
    .selectAll()
    .where((or) =>
      or.or([
        or('sked_id', 'in', or.selectFrom(listed([...new Set(skedIds)])).select('value')),
        ...(only ? [] : [or.and([or('queued_at', 'is', null), or('dropped_at', 'is', null)])]),
      ]),
    )
    .execute();
}
