import { mkdtempSync, readFileSync, readdirSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { authSecret } from '~/server/auth/secret';
import { startChild, typescript } from './children';

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'echotide-secret-'));
});
afterEach(() => {
  rmSync(folder, { recursive: true, force: true });
});

it('is made once, for its owner only, and is different for each installation', () => {
  const secret = authSecret(folder);
  expect(secret).toMatch(/^[\w-]{64}$/);
  expect(authSecret(folder)).toBe(secret);
  expect(readFileSync(path.join(folder, 'auth-secret'), 'utf8').trim()).toBe(secret);
  expect(statSync(path.join(folder, 'auth-secret')).mode & 0o777).toBe(0o600);
  const other = mkdtempSync(path.join(folder, 'other-'));
  expect(authSecret(other)).not.toBe(secret);
});

it('is one secret for processes that start together', async () => {
  const file = 'tests/integration/platform/secretWorker.ts';
  const all = [1, 2, 3].map(() => startChild(typescript(file, folder), {}).ended);
  const secrets = new Set((await Promise.all(all)).map(({ output }) => output));
  expect([...secrets]).toEqual([authSecret(folder)]);
  expect(readdirSync(folder)).toEqual(['auth-secret']);
}, 60_000);

it('is refused when somebody shortened it', () => {
  writeFileSync(path.join(folder, 'auth-secret'), 'short\n');
  expect(() => authSecret(folder)).toThrow('too short to be a secret');
});
