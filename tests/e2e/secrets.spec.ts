import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { expect, test } from './support/test';

/** Every file of the build, as bytes in a string. */
function buildFiles(): { file: string; content: string }[] {
  return readdirSync('dist', { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => path.join(entry.parentPath, entry.name))
    .map((file) => ({ file, content: readFileSync(file, 'latin1') }));
}

test('the build holds neither the session secret nor a secret from .env', ({ empty: server }) => {
  const secretFile = path.join(path.dirname(server.databaseFile), 'auth-secret');
  const secrets = [readFileSync(secretFile, 'utf8').trim(), ...secretsOfDotEnv()];
  const files = buildFiles();
  expect(files.length).toBeGreaterThan(20);
  for (const secret of secrets) {
    expect(secret.length).toBeGreaterThan(3);
    expect(files.filter(({ content }) => content.includes(secret))).toEqual([]);
  }
});

test('files with a hash in their name may be kept for ever, pages may not', async ({
  empty: server,
}) => {
  const asset = readdirSync('dist/client/_astro').find((name) => name.endsWith('.js'))!;
  const file = await fetch(`${server.url}/_astro/${asset}`);
  expect(file.headers.get('cache-control')).toBe('public, max-age=31536000, immutable');
  expect(file.headers.get('x-content-type-options')).toBe('nosniff');
  const page = await fetch(server.url);
  expect(page.headers.get('cache-control')).not.toContain('immutable');
});

test('a body over 6 MB is refused before anything reads it', async ({ empty: server }) => {
  const response = await fetch(`${server.url}/api/v1/moon`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: 'x'.repeat(6_000_001),
  });
  expect(response.status).toBe(413);
  expect(await response.json()).toMatchObject({ error: { code: 'bodyTooLarge' } });
});

function secretsOfDotEnv(): string[] {
  const text = readdirSync('.').includes('.env') ? readFileSync('.env', 'utf8') : '';
  return [...text.matchAll(/^\w*(?:SECRET|PASSWORD)\w*=(.+)$/gm)].map(([, value]) => value!.trim());
}
