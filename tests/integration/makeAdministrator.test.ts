import { execFile } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { openDatabase, type Db } from '~/server/db/connection';
import { migrateToLatest } from '~/server/db/migrate';

let folder: string;
let db: Db;

beforeEach(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'echotide-administrator-'));
  db = openDatabase(path.join(folder, 'echotide.sqlite'));
  await migrateToLatest(db);
  const people = [
    { id: 'a', email: 'asta@qa9adm.example', confirmed_at: 1 },
    { id: 'b', email: 'bram@qb9adm.example', confirmed_at: null },
  ];
  for (const person of people) {
    await db
      .insertInto('person')
      .values({
        ...person,
        name: person.id,
        role: 'operator',
        password_hash: null,
        time_zone: 'UTC',
        locked_at: null,
        sessions_valid_from: 0,
        created_at: 0,
      })
      .execute();
  }
});
afterEach(async () => {
  await db.destroy();
  rmSync(folder, { recursive: true, force: true });
});

const makeAdministrator = (...args: string[]) =>
  promisify(execFile)(
    process.execPath,
    ['--import', 'tsx', 'src/cli/makeAdministrator.ts', ...args],
    { env: { ...process.env, DATA_DIR: folder } },
  );
const rolesById = async () => {
  const rows = await db.selectFrom('person').select(['id', 'role']).execute();
  return Object.fromEntries(rows.map(({ id, role }) => [id, role]));
};

it('makes a confirmed person an administrator and writes it into the audit trail', async () => {
  const { stdout } = await makeAdministrator('Asta@QA9ADM.example');
  expect(stdout).toContain('asta@qa9adm.example is an administrator now.');
  expect(await rolesById()).toEqual({ a: 'administrator', b: 'operator' });
  const audit = await db.selectFrom('audit').selectAll().execute();
  expect(audit).toMatchObject([{ action: 'person.role', subject: 'a', person_id: null }]);
});

it.each([['bram@qb9adm.example'], ['nobody@qb9adm.example']])(
  'changes nothing for %s, which nobody has confirmed',
  async (email) => {
    await expect(makeAdministrator(email)).rejects.toMatchObject({
      code: 1,
      stderr: expect.stringContaining('Nobody has registered and confirmed') as string,
    });
    expect(await rolesById()).toEqual({ a: 'operator', b: 'operator' });
  },
);
