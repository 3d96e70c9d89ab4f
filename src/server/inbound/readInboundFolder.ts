import { lstat, mkdir, readdir, readFile, rename } from 'node:fs/promises';
import path from 'node:path';
import { AppError, BodyTooLarge, InvalidInput } from '../errors';
import { log } from '../log';
import type { Services } from '../services';
import { LARGEST_MAIL_BYTES, receiveMail } from './receiveMail';

const AT_ONCE = 50;

/**
 * Takes the mails out of `new` of the configured folder (a Maildir): each goes to `cur` when it has been dealt with, to
 * `failed` when it cannot be. One that is met by a fault of ours stays where it is for the next turn. Returns how many
 * were taken.
 */
export async function readInboundFolder(services: Services): Promise<number> {
  const { folder, address } = services.config.inbound;
  if (folder === null || address === null) return 0;
  for (const name of ['new', 'cur', 'failed']) {
    await mkdir(path.join(folder, name), { recursive: true, mode: 0o700 });
  }
  const names = (await readdir(path.join(folder, 'new')))
    .filter((name) => !name.startsWith('.'))
    .sort()
    .slice(0, AT_ONCE);
  let taken = 0;
  for (const name of names) {
    const to = await destinationOf(services, path.join(folder, 'new', name));
    if (to === null) continue;
    await rename(path.join(folder, 'new', name), path.join(folder, to, seen(name, to)));
    taken += 1;
  }
  return taken;
}

async function destinationOf(services: Services, file: string): Promise<'cur' | 'failed' | null> {
  try {
    const outcome = await receiveMail(services, await readMailFile(file));
    log.debug({ file: path.basename(file), outcome }, 'mail file read');
    return 'cur';
  } catch (error) {
    if (error instanceof AppError) {
      log.warn({ file: path.basename(file), reason: error.message }, 'mail file put aside');
      return 'failed';
    }
    log.error({ file: path.basename(file), err: error }, 'mail file could not be read now');
    return null;
  }
}

async function readMailFile(file: string): Promise<Uint8Array> {
  const found = await lstat(file);
  if (!found.isFile()) throw new InvalidInput('It is no regular file.');
  if (found.size > LARGEST_MAIL_BYTES) {
    throw new BodyTooLarge(`The mail is larger than ${LARGEST_MAIL_BYTES / 1000} kB.`);
  }
  return readFile(file);
}

/** Maildir marks what has been read by flags at the end of its name. */
function seen(name: string, to: 'cur' | 'failed'): string {
  return to === 'cur' && !name.includes(':2,') ? `${name}:2,S` : name;
}
