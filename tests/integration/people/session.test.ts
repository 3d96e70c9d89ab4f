import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { encode } from '@auth/core/jwt';
import type { APIContext } from 'astro';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import { hashPassword } from '~/server/auth/password';
import { migrateToLatest } from '~/server/db/migrate';

const EMAIL = 'ylva@station.example';
const PASSWORD = 'a quiet libration';
const COOKIE = '__Secure-authjs.session-token';
const HOUR_S = 3600;

interface SetCookie {
  value: string;
  options: {
    httpOnly?: boolean;
    secure?: boolean;
    sameSite?: string;
    path?: string;
    maxAge?: number;
  };
}

/** As much of a request as a session needs; remembers what is set. */
function request(cookie = '') {
  const set = new Map<string, SetCookie>();
  const context = {
    request: new Request('https://echotide.example/', { headers: { cookie } }),
    cookies: {
      set: (name: string, value: string, options: SetCookie['options']) =>
        set.set(name, { value, options }),
    },
  } as unknown as Pick<APIContext, 'cookies' | 'request'>;
  return { context, set };
}

let folder: string;
let session: typeof import('~/server/auth/session');
let shared: import('~/server/services').Services;
let secret: string;

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'echotide-session-'));
  Object.assign(process.env, {
    PUBLIC_URL: 'https://echotide.example',
    DATA_DIR: folder,
    SMTP_HOST: '127.0.0.1',
    MAIL_FROM: 'echotide@echotide.example',
    LOG_LEVEL: 'silent',
  });
  session = await import('~/server/auth/session');
  shared = (await import('~/server/services')).services();
  secret = (await import('~/server/auth/secret')).authSecret();
  await migrateToLatest(shared.db);
});
afterAll(async () => {
  await shared.db.destroy();
  rmSync(folder, { recursive: true, force: true });
});

beforeEach(async () => {
  await shared.db.deleteFrom('person').execute();
  await shared.db
    .insertInto('person')
    .values({
      id: 'ylva',
      email: EMAIL,
      name: 'Ylva',
      password_hash: await hashPassword(PASSWORD),
      role: 'operator',
      time_zone: 'UTC',
      confirmed_at: 1,
      locked_at: null,
      sessions_valid_from: 0,
      created_at: 1,
    })
    .execute();
});

async function signedIn(): Promise<string> {
  const { context, set } = request();
  await session.signInByPassword(context, { email: EMAIL, password: PASSWORD });
  return `${COOKIE}=${set.get(COOKIE)?.value ?? ''}`;
}

/** A session cookie made `ageS` ago by whoever has `withSecret`. */
async function madeCookie(ageS: number, withSecret = secret): Promise<string> {
  vi.useFakeTimers({ toFake: ['Date'], now: Date.now() - ageS * 1000 });
  try {
    const token = { sub: 'ylva', signedInAtMs: Date.now() };
    const given = { token, secret: withSecret, salt: COOKIE, maxAge: 30 * 24 * HOUR_S };
    return `${COOKIE}=${await encode(given)}`;
  } finally {
    vi.useRealTimers();
  }
}

describe('signing in', () => {
  it('sets one cookie that scripts cannot read and other sites cannot send', async () => {
    const { context, set } = request();
    await session.signInByPassword(context, { email: EMAIL, password: PASSWORD });
    expect([...set.keys()]).toEqual([COOKIE]);
    expect(set.get(COOKIE)?.options).toMatchObject({
      httpOnly: true,
      secure: true,
      sameSite: 'lax',
      path: '/',
    });
    expect(set.get(COOKIE)?.value).not.toContain(EMAIL);
  });

  it('with a wrong password sets nothing and says why', async () => {
    const { context, set } = request();
    const refused = session.signInByPassword(context, { email: EMAIL, password: 'wrong' });
    await expect(refused).rejects.toMatchObject({ reason: 'wrong' });
    expect(set.size).toBe(0);
  });
});

describe('reading a session', () => {
  it('gives the person, and leaves a fresh cookie alone', async () => {
    const { context, set } = request(await signedIn());
    expect(await session.readSession(context)).toMatchObject({ id: 'ylva', name: 'Ylva' });
    expect(set.size).toBe(0);
  });

  it('gives nobody without a cookie', async () => {
    expect(await session.readSession(request().context)).toBeNull();
  });

  it('prolongs a cookie of some age, without making the sign-in younger', async () => {
    const { context, set } = request(await madeCookie(20 * 24 * HOUR_S));
    expect(await session.readSession(context)).toMatchObject({ id: 'ylva' });
    const rolled = set.get(COOKIE);
    expect(rolled?.value).toBeTruthy();
    await shared.db
      .updateTable('person')
      .set({ sessions_valid_from: Date.now() - 24 * HOUR_S * 1000 })
      .execute();
    const later = request(`${COOKIE}=${rolled?.value ?? ''}`);
    expect(await session.readSession(later.context)).toBeNull();
  });

  it('ends after 30 days unused', async () => {
    const { context } = request(await madeCookie(31 * 24 * HOUR_S));
    expect(await session.readSession(context)).toBeNull();
  });

  it.each([
    ['made with another secret', () => madeCookie(0, 'another secret of more than 32 characters')],
    ['that is no token', () => Promise.resolve(`${COOKIE}=nonsense`)],
  ])('takes a cookie away %s', async (_case, cookie) => {
    const { context, set } = request(await cookie());
    expect(await session.readSession(context)).toBeNull();
    expect(set.get(COOKIE)).toMatchObject({ value: '', options: { maxAge: 0 } });
  });

  it('takes the cookie away when sessions were ended', async () => {
    const cookie = await signedIn();
    await shared.db
      .updateTable('person')
      .set({ sessions_valid_from: Date.now() + 1 })
      .execute();
    const { context, set } = request(cookie);
    expect(await session.readSession(context)).toBeNull();
    expect(set.get(COOKIE)?.value).toBe('');
  });
});

describe('signing out', () => {
  it('takes the cookie away', async () => {
    const { context, set } = request(await signedIn());
    await session.signOut(context);
    expect(set.get(COOKIE)).toMatchObject({ value: '', options: { maxAge: 0 } });
  });
});
