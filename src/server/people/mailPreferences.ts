import {
  DEFAULT_MAIL_PREFERENCE,
  readMailPreference,
  type MailPreference,
} from '../../domain/people/mailPreference';
import type { Db } from '../db/connection';
import { listed } from '../db/listed';
import type { Tx } from '../db/transaction';

/** A person's wishes and since when they hold; 0 for the defaults. */
export interface HeldPreference extends MailPreference {
  sinceMs: number;
}

const UNCHANGED: HeldPreference = { ...DEFAULT_MAIL_PREFERENCE, sinceMs: 0 };

/** Which mail a person wants. */
export async function mailPreferenceOf(db: Db | Tx, personId: string): Promise<HeldPreference> {
  return (await mailPreferencesOf(db, [personId])).of(personId);
}

/** Which mail each of these people wants, in one query. */
export async function mailPreferencesOf(
  db: Db | Tx,
  personIds: readonly string[],
): Promise<{ of: (personId: string) => HeldPreference }> {
  const rows = await db
    .selectFrom('mail_preference')
    .selectAll()
    .where('person_id', 'in', (ids) => ids.selectFrom(listed(personIds)).select('value'))
    .execute();
  const held = new Map(
    rows.map((row) => [
      row.person_id,
      { ...readMailPreference(JSON.parse(row.preference_json)), sinceMs: row.updated_at },
    ]),
  );
  return { of: (personId) => held.get(personId) ?? UNCHANGED };
}
