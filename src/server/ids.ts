import { createHash, randomBytes, randomUUID } from 'node:crypto';

/** An id that cannot be guessed. */
export function newId(): string {
  return randomUUID();
}

/** A secret of 256 bits for a link in a mail, and the hash under which it is stored. */
export function newSecret(): { secret: string; hash: string } {
  const secret = randomBytes(32).toString('base64url');
  return { secret, hash: hashSecret(secret) };
}

export function hashSecret(secret: string): string {
  return createHash('sha256').update(secret).digest('base64url');
}
