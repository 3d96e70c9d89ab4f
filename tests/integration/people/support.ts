import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { Viewer } from '~/server/auth/viewer';
import { readConfig } from '~/server/config';
import { openDatabase } from '~/server/db/connection';
import { migrateToLatest } from '~/server/db/migrate';
import type { OutboxRow, PersonRow } from '~/server/db/tables';
import { confirmMail } from '~/server/people/confirmMail';
import { registerPerson } from '~/server/people/registerPerson';
import type { Services } from '~/server/services';

export const PASSWORD = 'a quiet libration';

/** A database of its own, with a clock that tests move. */
export interface House extends Services {
  passMs: (ms: number) => void;
  end: () => Promise<void>;
}

export async function openHouse(): Promise<House> {
  const folder = mkdtempSync(path.join(tmpdir(), 'echotide-people-'));
  const config = readConfig({
    PUBLIC_URL: 'http://127.0.0.1:4998',
    DATA_DIR: folder,
    SMTP_HOST: '127.0.0.1',
    MAIL_FROM: 'Echotide <echotide@echotide.example>',
  });
  const db = openDatabase(config.databaseFile);
  await migrateToLatest(db);
  let nowMs = Date.UTC(2027, 0, 18, 18, 42);
  return {
    db,
    config,
    now: () => nowMs,
    passMs: (ms) => {
      nowMs += ms;
    },
    end: async () => {
      await db.destroy();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}

/** Mails to an address, oldest first. */
export function mailsTo({ db }: House, email: string): Promise<OutboxRow[]> {
  return db
    .selectFrom('outbox')
    .selectAll()
    .where('recipient', '=', email)
    .orderBy('created_at')
    .orderBy('id')
    .execute();
}

/** The secret of the newest link of a kind ("/confirm/", "/reset/", "/sign-in/link/") in the mails to an address. */
export async function newestSecret(house: House, email: string, kind: string): Promise<string> {
  const bodies = (await mailsTo(house, email)).map((mail) => mail.text_body);
  const found = bodies.flatMap((body) =>
    [...body.matchAll(/http:\/\/127\.0\.0\.1:4998(\S+)/g)].map((match) => match[1] ?? ''),
  );
  const link = found.filter((url) => url.startsWith(kind)).at(-1);
  if (link === undefined) throw new Error(`No link ${kind} was mailed to ${email}.`);
  return link.slice(kind.length);
}

export async function personOf({ db }: House, email: string): Promise<PersonRow> {
  return db.selectFrom('person').selectAll().where('email', '=', email).executeTakeFirstOrThrow();
}

/** Registers and confirms somebody with `PASSWORD`. */
export async function settle(
  house: House,
  name: string,
  role?: PersonRow['role'],
): Promise<Viewer> {
  const email = `${name.toLowerCase()}@station.example`;
  await registerPerson(house, { name, email, timeZone: 'Europe/Berlin' });
  const secret = await newestSecret(house, email, '/confirm/');
  const { id } = await confirmMail(house, { secret, password: PASSWORD });
  if (role) await house.db.updateTable('person').set({ role }).where('id', '=', id).execute();
  house.passMs(60_000);
  return { id, email, name, role: role ?? 'operator', timeZone: 'Europe/Berlin' };
}
