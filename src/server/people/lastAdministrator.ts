import type { PersonRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { Conflict } from '../errors';

/** Throws `Conflict` when nobody else could administer the service without this person. */
export async function requireAnotherAdministrator(tx: Tx, person: PersonRow): Promise<void> {
  if (person.role !== 'administrator') return;
  const other = await tx
    .selectFrom('person')
    .select('id')
    .where('role', '=', 'administrator')
    .where('id', '<>', person.id)
    .where('confirmed_at', 'is not', null)
    .where('locked_at', 'is', null)
    .executeTakeFirst();
  if (!other) {
    throw new Conflict(`${person.name} is the last administrator. Make somebody else one first.`);
  }
}
