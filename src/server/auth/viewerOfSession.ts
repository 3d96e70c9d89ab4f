import { findPerson, isActive } from '../people/findPerson';
import type { Services } from '../services';
import type { Viewer } from './viewer';

/** What a session token says once it is decrypted. */
export interface SessionClaims {
  personId?: unknown;
  /** When this session was started; rolling the cookie does not change it. */
  signedInAtMs?: unknown;
}

/**
 * The person behind a session, or null when the session is over: the person is gone, not confirmed or
 * locked, or signed in before the password was changed or everything was signed out.
 */
export async function viewerOfSession(
  { db }: Pick<Services, 'db'>,
  { personId, signedInAtMs }: SessionClaims,
): Promise<Viewer | null> {
  if (typeof personId !== 'string' || typeof signedInAtMs !== 'number') return null;
  const person = await findPerson(db, personId);
  if (!person || !isActive(person) || signedInAtMs < person.sessions_valid_from) return null;
  const { id, email, name, role, time_zone: timeZone } = person;
  return { id, email, name, role, timeZone };
}
