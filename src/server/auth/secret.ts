import { randomBytes } from 'node:crypto';
import { linkSync, readFileSync, unlinkSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { config } from '../config';

const FILE = 'auth-secret';
const LEAST_LENGTH = 32;

const known = new Map<string, string>();

/**
 * The secret that signs sessions. It is made at the first start as a file beside the database that only
 * its owner can read, and is never part of the build or of a setting. Processes that start together
 * agree on one. Throws when the file is there but unusable.
 */
export function authSecret(dataDir: string = config().dataDir): string {
  const file = path.join(dataDir, FILE);
  const secret = known.get(file) ?? read(file) ?? make(file);
  known.set(file, secret);
  return secret;
}

function read(file: string): string | undefined {
  let text: string;
  try {
    text = readFileSync(file, 'utf8').trim();
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return undefined;
    throw error;
  }
  if (text.length < LEAST_LENGTH) {
    throw new Error(`${file} is too short to be a secret; remove it to have a new one made.`);
  }
  return text;
}

/** link() refuses an existing name, so the first of two processes wins and both read the same file. */
function make(file: string): string {
  const draft = `${file}.${process.pid}.${randomBytes(4).toString('hex')}`;
  writeFileSync(draft, `${randomBytes(48).toString('base64url')}\n`, { mode: 0o600, flag: 'wx' });
  try {
    linkSync(draft, file);
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error;
  } finally {
    unlinkSync(draft);
  }
  const secret = read(file);
  if (secret === undefined) throw new Error(`${file} vanished while it was being made.`);
  return secret;
}
