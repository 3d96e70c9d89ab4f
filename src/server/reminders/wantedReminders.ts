import { isOfUse, reminderTimes, type ReminderTime } from '../../domain/sked/reminders';
import { DAY_MS } from '../../domain/time/interval';
import type { Db } from '../db/connection';
import type { ReminderTable } from '../db/tables';
import { listed } from '../db/listed';
import type { Tx } from '../db/transaction';
import { mailPreferencesOf } from '../people/mailPreferences';
import { crewsOfSkeds, type CrewMember } from '../skeds/crews';

/** Older skeds have no reminder left that could be of use. */
const LOOK_BACK_MS = 5 * DAY_MS;

/** What makes a reminder one of its kind: there is never a second row with the same. */
export interface ReminderKey {
  skedId: string;
  personId: string;
  kind: ReminderTime['kind'];
  minutes: number;
  agreedVersion: number;
}

export interface WantedReminder extends ReminderKey, ReminderTime {
  /** Since when all that it follows from holds: the agreement, the place in the crew, the person's wishes. */
  sinceMs: number;
}

export function keyText(key: ReminderKey): string {
  return [key.skedId, key.personId, key.kind, key.minutes, key.agreedVersion].join(' ');
}

export function keyTextOfRow(row: Omit<ReminderTable, 'id'>): string {
  return keyText({
    skedId: row.sked_id,
    personId: row.person_id,
    kind: row.kind,
    minutes: row.minutes,
    agreedVersion: row.agreed_version,
  });
}

interface AgreedSked {
  id: string;
  agreed_version: number;
  start_at: number;
  end_at: number;
  agreed_at: number;
}

/**
 * The reminders that follow from the skeds, their crews and the wishes of these people as they are now: before the
 * start while the sked is agreed and the start is ahead, after the end while the report of one of the person's stations
 * is due. Nothing here depends on which were made or sent before.
 */
export async function wantedReminders(
  db: Db | Tx,
  nowMs: number,
  only?: readonly string[],
): Promise<WantedReminder[]> {
  const skeds = await agreedSkeds(db, nowMs, only);
  const ids = skeds.map((sked) => sked.id);
  const crews = await crewsOfSkeds(db, ids);
  const people = new Set([...crews.values()].flat().map((member) => member.personId));
  const wishes = await mailPreferencesOf(db, [...people]);
  const reported = await reportedBy(db, ids);
  return skeds.flatMap((sked) =>
    (crews.get(sked.id) ?? []).flatMap((member) =>
      ofMember(sked, member, wishes.of(member.personId), nowMs).filter(({ kind }) =>
        kind === 'report'
          ? member.stationIds.some((id) => !reported.has(`${sked.id} ${id}`))
          : !reported.has(sked.id),
      ),
    ),
  );
}

function ofMember(
  sked: AgreedSked,
  member: CrewMember,
  wish: Parameters<typeof reminderTimes>[1] & { sinceMs: number },
  nowMs: number,
): WantedReminder[] {
  const slot = { startMs: sked.start_at, endMs: sked.end_at };
  return reminderTimes(slot, wish)
    .filter(({ kind, dueMs }) => isOfUse(kind, dueMs, slot, nowMs))
    .map((time) => ({
      ...time,
      skedId: sked.id,
      personId: member.personId,
      agreedVersion: sked.agreed_version,
      // A clock that was put back may have written an instant that is still to come.
      sinceMs: Math.min(nowMs, Math.max(sked.agreed_at, member.sinceMs, wish.sinceMs)),
    }));
}

async function agreedSkeds(
  db: Db | Tx,
  nowMs: number,
  only: readonly string[] | undefined,
): Promise<AgreedSked[]> {
  return db
    .selectFrom('sked')
    .select((select) => [
      'id',
      select.ref('agreed_version').$notNull().as('agreed_version'),
      'start_at',
      'end_at',
      select.fn
        .coalesce(
          select
            .selectFrom('sked_event')
            .select((event) => event.fn.max('at').as('at'))
            .whereRef('sked_event.sked_id', '=', 'sked.id')
            .where('kind', '=', 'agreed'),
          'created_at',
        )
        .as('agreed_at'),
    ])
    .where('state', 'in', ['agreed', 'reported'])
    .where('agreed_version', 'is not', null)
    .where('end_at', '>', nowMs - LOOK_BACK_MS)
    .$if(only !== undefined, (query) =>
      query.where('id', 'in', (ids) => ids.selectFrom(listed(only ?? [])).select('value')),
    )
    .execute();
}

/** "sked station" of every report, and the sked alone for every sked that has one. */
async function reportedBy(db: Db | Tx, skedIds: readonly string[]): Promise<Set<string>> {
  const rows = await db
    .selectFrom('sked_report')
    .select(['sked_id', 'station_id'])
    .where('sked_id', 'in', (ids) => ids.selectFrom(listed(skedIds)).select('value'))
    .execute();
  return new Set(rows.flatMap((row) => [row.sked_id, `${row.sked_id} ${row.station_id}`]));
}
