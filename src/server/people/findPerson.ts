import type { Db } from '../db/connection';
import type { PersonRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { NotFound } from '../errors';

export function findPersonByEmail(db: Db | Tx, email: string): Promise<PersonRow | undefined> {
  return db.selectFrom('person').selectAll().where('email', '=', email).executeTakeFirst();
}

export function findPerson(db: Db | Tx, id: string): Promise<PersonRow | undefined> {
  return db.selectFrom('person').selectAll().where('id', '=', id).executeTakeFirst();
}

/** Throws `NotFound`. */
export async function getPerson(db: Db | Tx, id: string): Promise<PersonRow> {
  const person = await findPerson(db, id);
  if (!person) throw new NotFound('Nobody with that id is registered here.');
  return person;
}

/** Whether the person may sign in and act: the address is confirmed and no administrator locked the account. */
export function isActive(person: Pick<PersonRow, 'confirmed_at' | 'locked_at'>): boolean {
  return person.confirmed_at !== null && person.locked_at === null;
}
