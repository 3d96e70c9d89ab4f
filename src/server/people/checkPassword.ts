import { passwordMatches } from '../auth/password';
import type { PersonRow } from '../db/tables';
import type { Services } from '../services';
import { findPersonByEmail, isActive } from './findPerson';

export type PasswordCheck =
  { outcome: 'right'; person: PersonRow } | { outcome: 'wrong' } | { outcome: 'locked' };

/**
 * Checks address and password. Unknown addresses, unconfirmed ones and wrong passwords cost the same
 * time and give the same answer; only who knows the password learns that the account is locked.
 */
export async function checkPassword(
  { db }: Pick<Services, 'db'>,
  { email, password }: { email: string; password: string },
): Promise<PasswordCheck> {
  const person = await findPersonByEmail(db, email);
  const matches = await passwordMatches(password, person?.password_hash ?? null);
  if (!person || !matches || person.confirmed_at === null) return { outcome: 'wrong' };
  return isActive(person) ? { outcome: 'right', person } : { outcome: 'locked' };
}
