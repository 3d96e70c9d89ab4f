import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { hashSecret } from '~/server/ids';
import { checkPassword } from '~/server/people/checkPassword';
import { confirmMail } from '~/server/people/confirmMail';
import { registerPerson } from '~/server/people/registerPerson';
import { requestPasswordReset } from '~/server/people/requestPasswordReset';
import { peekToken, TOKEN_LIFETIME_MS } from '~/server/people/tokens';
import {
  mailsTo,
  newestSecret,
  openHouse,
  PASSWORD,
  personOf,
  settle,
  type House,
} from './support';

const EDDA = { name: 'Edda', email: 'edda@station.example', timeZone: 'America/New_York' };

let house: House;
beforeEach(async () => {
  house = await openHouse();
});
afterEach(() => house.end());

describe('registering', () => {
  it('opens the account only when the link is used, with the password chosen there', async () => {
    await registerPerson(house, EDDA);
    expect((await personOf(house, EDDA.email)).confirmed_at).toBeNull();
    const secret = await newestSecret(house, EDDA.email, '/confirm/');
    await confirmMail(house, { secret, password: PASSWORD });
    const person = await personOf(house, EDDA.email);
    expect(person).toMatchObject({
      name: 'Edda',
      role: 'operator',
      time_zone: 'America/New_York',
      confirmed_at: house.now(),
    });
    expect(person.password_hash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    expect(await checkPassword(house, { email: EDDA.email, password: PASSWORD })).toMatchObject({
      outcome: 'right',
    });
  });

  it('stores only the hash of the secret', async () => {
    await registerPerson(house, EDDA);
    const secret = await newestSecret(house, EDDA.email, '/confirm/');
    expect(secret.length).toBeGreaterThanOrEqual(43);
    const rows = await house.db.selectFrom('person_token').selectAll().execute();
    expect(rows).toHaveLength(1);
    expect(JSON.stringify(rows)).not.toContain(secret);
    expect(rows[0]?.token_hash).toBe(hashSecret(secret));
  });

  it('says the time limit of the link in UTC and in the person’s zone', async () => {
    await registerPerson(house, EDDA);
    const [mail] = await mailsTo(house, EDDA.email);
    expect(mail?.text_body).toContain('Thu 21 Jan 2027 18:42 UTC, EST 13:42');
  });

  it('mails a stranger no words of whoever entered the address', async () => {
    await registerPerson(house, { ...EDDA, name: 'Visit elsewhere.example now' });
    const [mail] = await mailsTo(house, EDDA.email);
    expect(JSON.stringify(mail)).not.toContain('elsewhere.example');
  });

  it('changes nothing for an address that has an account, and mails its owner', async () => {
    const ylva = await settle(house, 'Ylva');
    const before = await personOf(house, ylva.email);
    const mailsBefore = (await mailsTo(house, ylva.email)).length;
    await registerPerson(house, { name: 'Somebody', email: ylva.email, timeZone: 'UTC' });
    expect(await personOf(house, ylva.email)).toEqual(before);
    const mails = await mailsTo(house, ylva.email);
    expect(mails).toHaveLength(mailsBefore + 1);
    const subjects = mails.map((mail) => mail.subject);
    expect(subjects).toContain('You already have an Echotide account');
    expect(mails.at(-1)?.text_body).not.toMatch(/\/confirm\/|\/reset\/|Somebody/);
  });

  it('mails a new link when somebody registers twice before confirming; both work until one is used', async () => {
    await registerPerson(house, EDDA);
    const first = await newestSecret(house, EDDA.email, '/confirm/');
    house.passMs(1000);
    await registerPerson(house, { ...EDDA, name: 'Edda of the hill' });
    const second = await newestSecret(house, EDDA.email, '/confirm/');
    expect(second).not.toBe(first);
    await confirmMail(house, { secret: first, password: PASSWORD });
    // What was typed with the link that was used.
    expect((await personOf(house, EDDA.email)).name).toBe('Edda');
    expect(await peekToken(house, second, 'confirmMail')).toMatchObject({ state: 'used' });
  });
});

describe('a confirmation link', () => {
  it('works once, and a second use does not change the password', async () => {
    await registerPerson(house, EDDA);
    const secret = await newestSecret(house, EDDA.email, '/confirm/');
    await confirmMail(house, { secret, password: PASSWORD });
    const again = confirmMail(house, { secret, password: 'another password' });
    await expect(again).rejects.toMatchObject({ status: 409, details: { state: 'used' } });
    const check = await checkPassword(house, { email: EDDA.email, password: 'another password' });
    expect(check.outcome).toBe('wrong');
  });

  it('stops working at its time and not before', async () => {
    await registerPerson(house, EDDA);
    const secret = await newestSecret(house, EDDA.email, '/confirm/');
    house.passMs(TOKEN_LIFETIME_MS.confirmMail - 1);
    expect((await peekToken(house, secret, 'confirmMail')).state).toBe('usable');
    house.passMs(1);
    await expect(confirmMail(house, { secret, password: PASSWORD })).rejects.toMatchObject({
      status: 409,
      details: { state: 'expired' },
    });
    expect((await personOf(house, EDDA.email)).confirmed_at).toBeNull();
  });

  it('is not accepted for another purpose, nor another link for it', async () => {
    const ylva = await settle(house, 'Ylva');
    await requestPasswordReset(house, ylva.email);
    const reset = await newestSecret(house, ylva.email, '/reset/');
    const misused = confirmMail(house, { secret: reset, password: 'another password' });
    await expect(misused).rejects.toMatchObject({ status: 404 });
    expect((await peekToken(house, reset, 'resetPassword')).state).toBe('usable');
  });

  it('does not open a locked account and stays unused', async () => {
    await registerPerson(house, EDDA);
    const secret = await newestSecret(house, EDDA.email, '/confirm/');
    await house.db.updateTable('person').set({ locked_at: house.now() }).execute();
    await expect(confirmMail(house, { secret, password: PASSWORD })).rejects.toMatchObject({
      status: 403,
    });
    expect((await peekToken(house, secret, 'confirmMail')).state).toBe('usable');
  });
});
