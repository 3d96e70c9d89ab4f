import { hash, verify, type Options } from '@node-rs/argon2';

/** Of argon2id, the library's own default: 19 MiB, two passes, one lane, as OWASP recommends. */
const ARGON2ID: Options = {
  memoryCost: 19_456,
  timeCost: 2,
  parallelism: 1,
  outputLen: 32,
};

export function hashPassword(password: string): Promise<string> {
  return hash(password.normalize('NFKC'), ARGON2ID);
}

let decoy: Promise<string> | undefined;

/**
 * Whether the password belongs to the hash. Without a hash (nobody of that address, or no password
 * set) it spends the same time and says no.
 */
export async function passwordMatches(password: string, stored: string | null): Promise<boolean> {
  decoy ??= hashPassword('nobody has this one');
  const matches = await verify(stored ?? (await decoy), password.normalize('NFKC'));
  return stored !== null && matches;
}
