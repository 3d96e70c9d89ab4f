import { verify } from '@node-rs/argon2';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { viewerOfSession } from '~/server/auth/viewerOfSession';
import { changePassword } from '~/server/people/changePassword';
import { checkPassword } from '~/server/people/checkPassword';
import { lockPerson } from '~/server/people/lockPerson';
import { registerPerson } from '~/server/people/registerPerson';
import { requestPasswordReset } from '~/server/people/requestPasswordReset';
import { requestSignInLink } from '~/server/people/requestSignInLink';
import { resetPassword } from '~/server/people/resetPassword';
import { signOutEverywhere } from '~/server/people/signOutEverywhere';
import { peekToken, TOKEN_LIFETIME_MS } from '~/server/people/tokens';
import { updateProfile } from '~/server/people/updateProfile';
import { useSignInLink } from '~/server/people/useSignInLink';
import {
  mailsTo,
  newestSecret,
  openHouse,
  PASSWORD,
  personOf,
  settle,
  type House,
} from './support';
import type { Viewer } from '~/server/auth/viewer';

vi.mock('@node-rs/argon2', async (original) => {
  const real = await original<typeof import('@node-rs/argon2')>();
  return { ...real, verify: vi.fn(real.verify) };
});

const NEW_PASSWORD = 'perigee before dawn';

let house: House;
let ylva: Viewer;
let osvin: Viewer;
beforeEach(async () => {
  house = await openHouse();
  ylva = await settle(house, 'Ylva');
  osvin = await settle(house, 'Osvin', 'administrator');
});
afterEach(() => house.end());

const outcome = async (email: string, password: string) =>
  (await checkPassword(house, { email, password })).outcome;

/** A session that was started at this instant. */
const sessionOf = (viewer: Viewer, signedInAtMs: number) =>
  viewerOfSession(house, { personId: viewer.id, signedInAtMs });

describe('address and password', () => {
  it('gives one answer for a wrong password, an unknown address and an unconfirmed one', async () => {
    await registerPerson(house, { name: 'Edda', email: 'edda@station.example', timeZone: 'UTC' });
    expect(await outcome(ylva.email, PASSWORD)).toBe('right');
    expect(await outcome(ylva.email, NEW_PASSWORD)).toBe('wrong');
    expect(await outcome('nobody@station.example', PASSWORD)).toBe('wrong');
    expect(await outcome('edda@station.example', PASSWORD)).toBe('wrong');
  });

  it('makes the same check, with the same parameters, for unknown addresses too', async () => {
    const checksOf = async (email: string) => {
      vi.mocked(verify).mockClear();
      await outcome(email, NEW_PASSWORD);
      return vi.mocked(verify).mock.calls.map(([stored]) => String(stored).split('$').slice(0, 4));
    };
    const known = await checksOf(ylva.email);
    expect(known).toEqual([['', 'argon2id', 'v=19', 'm=19456,t=2,p=1']]);
    expect(await checksOf('nobody@station.example')).toEqual(known);
  });

  it('tells only who knows the password that the account is locked', async () => {
    await lockPerson(house, osvin, ylva.id);
    expect(await outcome(ylva.email, PASSWORD)).toBe('locked');
    expect(await outcome(ylva.email, NEW_PASSWORD)).toBe('wrong');
  });
});

describe('a sign-in link', () => {
  it('signs in once', async () => {
    await requestSignInLink(house, ylva.email);
    const secret = await newestSecret(house, ylva.email, '/sign-in/link/');
    expect(await useSignInLink(house, secret)).toMatchObject({ id: ylva.id });
    await expect(useSignInLink(house, secret)).rejects.toMatchObject({
      status: 409,
      details: { state: 'used' },
    });
  });

  it('is used by one of two that come at the same time', async () => {
    await requestSignInLink(house, ylva.email);
    const secret = await newestSecret(house, ylva.email, '/sign-in/link/');
    const both = await Promise.allSettled([
      useSignInLink(house, secret),
      useSignInLink(house, secret),
    ]);
    expect(both.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
  });

  it('expires', async () => {
    await requestSignInLink(house, ylva.email);
    const secret = await newestSecret(house, ylva.email, '/sign-in/link/');
    house.passMs(TOKEN_LIFETIME_MS.signIn);
    await expect(useSignInLink(house, secret)).rejects.toMatchObject({
      details: { state: 'expired' },
    });
  });

  it('does not reset a password, and a reset link does not sign in', async () => {
    await requestSignInLink(house, ylva.email);
    await requestPasswordReset(house, ylva.email);
    const link = await newestSecret(house, ylva.email, '/sign-in/link/');
    const reset = await newestSecret(house, ylva.email, '/reset/');
    await expect(
      resetPassword(house, { secret: link, password: NEW_PASSWORD }),
    ).rejects.toMatchObject({ status: 404 });
    await expect(useSignInLink(house, reset)).rejects.toMatchObject({ status: 404 });
    expect(await outcome(ylva.email, PASSWORD)).toBe('right');
  });

  it('is ended by a lock, and not mailed to a locked account or an unknown address', async () => {
    await requestSignInLink(house, ylva.email);
    const secret = await newestSecret(house, ylva.email, '/sign-in/link/');
    await lockPerson(house, osvin, ylva.id);
    await expect(useSignInLink(house, secret)).rejects.toMatchObject({ status: 409 });
    const before = (await mailsTo(house, ylva.email)).length;
    await requestSignInLink(house, ylva.email);
    await requestSignInLink(house, 'nobody@station.example');
    expect(await mailsTo(house, ylva.email)).toHaveLength(before);
    expect(await mailsTo(house, 'nobody@station.example')).toEqual([]);
  });

  it('becomes the confirmation link for an address not confirmed yet', async () => {
    await registerPerson(house, { name: 'Edda', email: 'edda@station.example', timeZone: 'UTC' });
    house.passMs(1000);
    await requestSignInLink(house, 'edda@station.example');
    const mails = await mailsTo(house, 'edda@station.example');
    expect(mails).toHaveLength(2);
    expect(mails[1]?.text_body).toContain('/confirm/');
    expect(mails[1]?.text_body).not.toContain('/sign-in/link/');
  });
});

describe('a new password', () => {
  it('by a reset link: the old one stops, the link is spent, other links end, a notice goes out', async () => {
    await requestSignInLink(house, ylva.email);
    const link = await newestSecret(house, ylva.email, '/sign-in/link/');
    await requestPasswordReset(house, ylva.email);
    const secret = await newestSecret(house, ylva.email, '/reset/');
    house.passMs(1000);
    await resetPassword(house, { secret, password: NEW_PASSWORD });
    expect(await outcome(ylva.email, PASSWORD)).toBe('wrong');
    expect(await outcome(ylva.email, NEW_PASSWORD)).toBe('right');
    await expect(resetPassword(house, { secret, password: PASSWORD })).rejects.toMatchObject({
      details: { state: 'used' },
    });
    expect((await peekToken(house, link, 'signIn')).state).toBe('used');
    const last = (await mailsTo(house, ylva.email)).at(-1);
    expect(last?.subject).toBe('Your Echotide password was changed');
  });

  it('by a reset link that is too old: nothing changes', async () => {
    await requestPasswordReset(house, ylva.email);
    const secret = await newestSecret(house, ylva.email, '/reset/');
    house.passMs(TOKEN_LIFETIME_MS.resetPassword);
    await expect(resetPassword(house, { secret, password: NEW_PASSWORD })).rejects.toMatchObject({
      details: { state: 'expired' },
    });
    expect(await outcome(ylva.email, PASSWORD)).toBe('right');
  });

  it('by the account page: only with the current one', async () => {
    const wrong = { currentPassword: NEW_PASSWORD, newPassword: 'something else here' };
    await expect(changePassword(house, ylva, wrong)).rejects.toMatchObject({
      status: 400,
      fields: [{ path: 'currentPassword' }],
    });
    expect(await outcome(ylva.email, PASSWORD)).toBe('right');
    await changePassword(house, ylva, { currentPassword: PASSWORD, newPassword: NEW_PASSWORD });
    expect(await outcome(ylva.email, NEW_PASSWORD)).toBe('right');
  });
});

describe('a session', () => {
  it('shows the person as they are now', async () => {
    const startedMs = house.now();
    await updateProfile(house, ylva, { name: 'Ylva of the barn', timeZone: 'Asia/Tokyo' });
    expect(await sessionOf(ylva, startedMs)).toEqual({
      ...ylva,
      name: 'Ylva of the barn',
      timeZone: 'Asia/Tokyo',
    });
  });

  it('ends with a change of the password; one started after it lives', async () => {
    const startedMs = house.now();
    house.passMs(5000);
    expect(await sessionOf(ylva, startedMs)).not.toBeNull();
    await changePassword(house, ylva, { currentPassword: PASSWORD, newPassword: NEW_PASSWORD });
    expect(await sessionOf(ylva, startedMs)).toBeNull();
    expect(await sessionOf(ylva, house.now())).not.toBeNull();
  });

  it('ends with "sign out everywhere"', async () => {
    const startedMs = house.now();
    house.passMs(5000);
    await signOutEverywhere(house, ylva);
    expect(await sessionOf(ylva, startedMs)).toBeNull();
    expect(await sessionOf(osvin, startedMs)).not.toBeNull();
  });

  it('ends with a lock, and when the person is gone', async () => {
    const startedMs = house.now();
    await lockPerson(house, osvin, ylva.id);
    expect(await sessionOf(ylva, startedMs)).toBeNull();
    expect(await sessionOf(ylva, house.now() + 1)).toBeNull();
    await house.db.deleteFrom('person').where('id', '=', ylva.id).execute();
    expect(await sessionOf(ylva, startedMs)).toBeNull();
  });

  it('needs complete claims', async () => {
    expect(await viewerOfSession(house, {})).toBeNull();
    expect(await viewerOfSession(house, { personId: ylva.id })).toBeNull();
    expect(await viewerOfSession(house, { personId: ylva.id, signedInAtMs: 'now' })).toBeNull();
  });

  it('belongs to a confirmed address', async () => {
    await registerPerson(house, { name: 'Edda', email: 'edda@station.example', timeZone: 'UTC' });
    const { id } = await personOf(house, 'edda@station.example');
    const claims = { personId: id, signedInAtMs: house.now() + 1 };
    expect(await viewerOfSession(house, claims)).toBeNull();
  });
});
