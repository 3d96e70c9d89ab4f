import { existsSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { backUp, requireIntact } from '~/server/db/backup';
import { openDatabase } from '~/server/db/connection';
import { startChild, typescript } from './children';
import { openGround, type Ground } from './ground';

let ground: Ground;
beforeEach(async () => {
  ground = await openGround();
});
afterEach(() => ground.end());

const fill = (count: number) =>
  ground.db
    .insertInto('installation')
    .values(Array.from({ length: count }, (_, n) => ({ name: `n${n}`, value: 'x'.repeat(500) })))
    .execute();

it('copies a database in use, with what is only in its write-ahead log', async () => {
  await fill(400);
  const target = path.join(ground.folder, 'copy.sqlite');
  await backUp(ground.config.databaseFile, target);
  expect(existsSync(`${target}-wal`)).toBe(false);
  const copy = openDatabase(target);
  const { count } = await copy
    .selectFrom('installation')
    .select(({ fn }) => fn.countAll<number>().as('count'))
    .executeTakeFirstOrThrow();
  expect(count).toBe(400);
  await copy.destroy();
});

it('never overwrites, and leaves no half copy', async () => {
  const target = path.join(ground.folder, 'copy.sqlite');
  writeFileSync(target, 'mine');
  await expect(backUp(ground.config.databaseFile, target)).rejects.toThrow('already there');
  expect(existsSync(`${target}.part`)).toBe(false);
});

it('refuses a damaged copy', async () => {
  await fill(400);
  const target = path.join(ground.folder, 'copy.sqlite');
  await backUp(ground.config.databaseFile, target);
  const { openSync, writeSync, closeSync } = await import('node:fs');
  const handle = openSync(target, 'r+');
  writeSync(handle, Buffer.alloc(20_000, 0xff), 0, 20_000, 4096 * 20);
  closeSync(handle);
  expect(() => {
    requireIntact(target);
  }).toThrow();
});

it('is a command that needs the data folder only', async () => {
  await fill(3);
  const args = typescript('src/cli/backup.ts');
  const { code, output } = await startChild(args, { DATA_DIR: ground.folder }).ended;
  expect(output).toMatch(
    /^Backed up to .*backups\/echotide-\d{8}T\d{6}Z\.sqlite; the copy was checked\.\n$/,
  );
  expect(code).toBe(0);
  const without = await startChild(args, {}).ended;
  expect(without).toEqual({
    code: 1,
    output: 'DATA_DIR is missing: name the folder that holds the database.\n',
  });
});
