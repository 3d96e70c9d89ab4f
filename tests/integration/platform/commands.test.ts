import { once } from 'node:events';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import net from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { ConfigurationMissing, readConfig } from '~/server/config';
import { startChild, typescript } from './children';
import { freePorts } from './freePorts';

let folder: string;
beforeEach(() => {
  folder = mkdtempSync(path.join(tmpdir(), 'echotide-commands-'));
});
afterEach(() => {
  rmSync(folder, { recursive: true, force: true });
});

const start = (env: Record<string, string>) =>
  startChild(['src/cli/start.mjs'], { DATA_DIR: folder, ...env }).ended;

describe('npm start', () => {
  it('says in one sentence that a port is taken, and which setting chooses another', async () => {
    const holder = net.createServer().listen(0, '127.0.0.1');
    await once(holder, 'listening');
    const { port } = holder.address() as net.AddressInfo;
    const [free] = await freePorts(1);
    const { code, output } = await start({ PORT: String(free), MAIL_PORT: String(port) });
    holder.close();
    expect(output).toBe(
      `Port ${port} is taken by another program: stop it, or choose another port with MAIL_PORT.\n`,
    );
    expect(code).toBe(1);
  });

  it.each([
    [{ PORT: 'abc' }, 'PORT is "abc", which is not a port (1 to 65535).\n'],
    [{ PORT: '70000' }, 'PORT is "70000", which is not a port (1 to 65535).\n'],
    [{ PORT: '4999', MAIL_PORT: '4999' }, 'PORT and MAIL_PORT are both 4999.\n'],
  ])('refuses %j', async (env, sentence) => {
    expect(await start(env)).toEqual({ code: 1, output: sentence });
  });
});

describe('a process that cannot start', () => {
  const settings = {
    PUBLIC_URL: 'https://echotide.example',
    SMTP_HOST: '127.0.0.1',
    MAIL_FROM: 'echotide@echotide.example',
  };
  const failure = (env: Record<string, string>) =>
    startChild(typescript('src/cli/prepare.ts'), env).ready.then(
      () => undefined,
      (error: unknown) => (error as Error).message,
    );

  it('names every setting that is missing', async () => {
    expect(await failure({})).toBe(
      'Echotide cannot start: PUBLIC_URL is missing; DATA_DIR is missing; SMTP_HOST is missing; MAIL_FROM is missing. .env.example explains each setting.',
    );
  }, 60_000);

  it('names a broken database', async () => {
    const file = path.join(folder, 'echotide.sqlite');
    writeFileSync(file, 'not a database, '.repeat(1000));
    expect(await failure({ ...settings, DATA_DIR: folder })).toBe(
      `The database ${file} cannot be opened: file is not a database.`,
    );
  }, 60_000);

  it('names a data folder that cannot be made', async () => {
    const file = path.join(folder, 'file');
    writeFileSync(file, '');
    expect(await failure({ ...settings, DATA_DIR: file })).toMatch(
      /^The folder .*\/file cannot be made or written to \(EEXIST\)\.$/,
    );
  }, 60_000);
});

describe('the configuration', () => {
  const whole = {
    PUBLIC_URL: 'https://echotide.example/somewhere',
    DATA_DIR: 'data',
    SMTP_HOST: 'mail.example',
    MAIL_FROM: 'echotide@echotide.example',
  };

  it('is checked and has usual values', () => {
    expect(readConfig(whole)).toMatchObject({
      publicUrl: 'https://echotide.example',
      host: '127.0.0.1',
      port: 4321,
      smtp: { port: 587, tls: 'starttls' },
      mailLeaseMs: 60_000,
      mailRetry: { firstMs: 15_000, longestMs: 3_600_000 },
      trustProxy: false,
      demo: false,
    });
  });

  it.each([
    [{ PORT: '0' }, 'PORT is "0", which is not usable'],
    [{ PUBLIC_URL: 'ftp://echotide.example' }, 'PUBLIC_URL is "ftp://echotide.example"'],
    [{ SMTP_TLS: 'perhaps' }, 'SMTP_TLS is "perhaps", which is not usable'],
    [{ MAIL_FROM: '' }, 'MAIL_FROM is missing'],
  ])('refuses %j', (change, words) => {
    const read = () => readConfig({ ...whole, ...change });
    expect(read).toThrow(ConfigurationMissing);
    expect(read).toThrow(words);
  });
});

it('lets nothing from .env into the build', async () => {
  const { default: astro } = (await import('../../../astro.config.mjs')) as {
    default: { vite?: { envDir?: unknown } };
  };
  expect(astro.vite?.envDir).toBe(false);
});
