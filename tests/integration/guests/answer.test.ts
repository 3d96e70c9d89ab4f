import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { Interval } from '~/domain/time/interval';
import { DAY_MS, HOUR_MS } from '~/domain/time/interval';
import { Conflict, Forbidden, NotFound } from '~/server/errors';
import { answerByLink } from '~/server/guests/answerByLink';
import { findGuestLink, secretIn } from '~/server/guests/guestLink';
import { mailFreshLink } from '~/server/guests/mailFreshLink';
import { readAnswer } from '~/server/guests/readAnswer';
import { reportByLink } from '~/server/guests/reportByLink';
import { limitsSchema, saveLimits } from '~/server/guests/saveLimits';
import { confirmMail } from '~/server/people/confirmMail';
import { registerPerson } from '~/server/people/registerPerson';
import { acceptSked } from '~/server/skeds/acceptSked';
import { cancelSked } from '~/server/skeds/cancelSked';
import { declineSked } from '~/server/skeds/declineSked';
import { getSked } from '~/server/skeds/getSked';
import { listSkeds, skedFilterSchema } from '~/server/skeds/listSkeds';
import { moveSked } from '~/server/skeds/moveSked';
import { listMyStations } from '~/server/stations/listMyStations';
import { updateProfile } from '~/server/stations/updateProfile';
import { commonWindows, newWorld, slotIn, type World } from '../skeds/world';
import { everything, GUEST, mailsTo, offerToGuest, secretOf } from './world';

let world: World;
let window: Interval;
let id: string;
let secret: string;

beforeEach(async () => {
  world = await newWorld();
  window = commonWindows(['QA1LUN', 'QC2FAR'])[0]!;
  ({ id } = await offerToGuest(world, slotIn(window, 40)));
  secret = secretOf((await mailsTo(world, GUEST.email))[0]!);
});
afterEach(() => world.close());

const ylva = () => world.people['QA1LUN']!;
const accept = (with_: string, version: number, sked = id) =>
  answerByLink(world.services, { secret: with_, id: sked }, (viewer, link) =>
    acceptSked(world.services, viewer, sked, { version, words: '', ...link }),
  );
const newestSecret = async () => secretOf((await mailsTo(world, GUEST.email)).at(-1)!);
const stateOf = async () => (await getSked(world.services, ylva(), id)).view.state;

describe('answering behind a link', () => {
  it('agrees, uses the link up, leads to the next one, and mails another', async () => {
    const path = await accept(secret, 1);
    expect(await stateOf()).toBe('agreed');
    expect((await findGuestLink(world.services, secret))!.state).toBe('used');
    expect((await findGuestLink(world.services, secretIn(path)))!.state).toBe('usable');
    const mails = await mailsTo(world, GUEST.email);
    expect(mails).toHaveLength(2);
    expect(mails.map((mail) => mail.calendar_method)).toEqual(['REQUEST', 'REQUEST']);
    expect(secretOf(mails[1]!)).not.toBe(secret);
    expect((await findGuestLink(world.services, secretOf(mails[1]!)))!.state).toBe('usable');
    expect(await mailsTo(world, ylva().email)).toHaveLength(2);
  });

  it('moves to another time, which the other side accepts', async () => {
    const other = slotIn(window, 75);
    const path = await answerByLink(world.services, { secret, id }, (viewer, link) =>
      moveSked(world.services, viewer, id, {
        version: 1,
        words: 'Later, please.',
        start: other.startMs,
        end: other.endMs,
        ...link,
      }),
    );
    const { view } = await getSked(world.services, ylva(), id);
    expect(view).toMatchObject({ state: 'offered', waitsForViewer: true, ...other });
    await acceptSked(world.services, ylva(), id, { version: view.version, words: '' });
    await answerByLink(world.services, { secret: secretIn(path), id }, (viewer, link) =>
      cancelSked(world.services, viewer, id, {
        version: view.version + 1,
        words: 'Storm',
        ...link,
      }),
    );
    expect(await stateOf()).toBe('cancelled');
  });

  it('reports, and mails a link although nobody else is told', async () => {
    const path = await accept(secret, 1);
    world.clock.nowMs = slotIn(window, 40).endMs + HOUR_MS;
    const before = (await mailsTo(world, GUEST.email)).length;
    await reportByLink(
      world.services,
      { secret: secretIn(path), id },
      { version: 2, result: 'completed', reportSent: 'O', reportReceived: '', words: 'RRR' },
    );
    expect(await stateOf()).toBe('reported');
    const mails = await mailsTo(world, GUEST.email);
    expect(mails).toHaveLength(before + 1);
    expect(mails.at(-1)!.subject).toMatch(/^Your report is kept/);
    expect((await findGuestLink(world.services, await newestSecret()))!.state).toBe('usable');
  });

  it('corrects the limits of the own station, and who answers has a name', async () => {
    const limits = limitsSchema.parse({
      name: 'Bea',
      locator: 'JO40ab',
      timeZone: 'Europe/Berlin',
      elevationFrom: '12,5',
      elevationTo: '',
      azimuthFrom: '80',
      azimuthTo: '290',
      hoursFrom: '6',
      hoursTo: '24:00',
    });
    const path = await saveLimits(world.services, secret, limits);
    const { own, person } = (await readAnswer(world.services, secretIn(path)))!;
    expect(own).toMatchObject({
      locator: 'JO40ab',
      timeZone: 'Europe/Berlin',
      sky: { elevationFromDeg: 12.5, azimuthFromDeg: 80, azimuthToDeg: 290 },
    });
    expect(own!.hours.weekly![0]).toEqual({ weekday: 1, from: '06:00', to: '24:00' });
    expect(person).toMatchObject({ name: 'Bea', time_zone: 'Europe/Berlin' });
    expect((await findGuestLink(world.services, secret))!.state).toBe('used');
  });

  it('says what is wrong with limits, each at its field', () => {
    const { error } = limitsSchema.safeParse({
      name: '',
      locator: 'nowhere',
      timeZone: 'x',
      elevationFrom: 'low',
      elevationTo: '91',
      azimuthFrom: '400',
      azimuthTo: '',
      hoursFrom: '25',
      hoursTo: '',
    });
    expect(error!.issues.map((issue) => issue.path.join('.')).sort()).toEqual([
      'azimuthFrom',
      'elevationFrom',
      'elevationTo',
      'hoursFrom',
      'hoursTo',
      'locator',
      'timeZone',
    ]);
    for (const issue of error!.issues) expect(issue.message).toMatch(/^[A-Z“].*\.$/);
    const half = limitsSchema.safeParse({
      locator: 'JO40aa',
      timeZone: 'UTC',
      azimuthFrom: '90',
      hoursFrom: '8',
      hoursTo: '9',
    });
    expect(half.error!.issues[0]!.path).toEqual(['azimuthTo']);
  });
});

describe('links that do not answer', () => {
  it('reading changes nothing', async () => {
    const before = await everything(world);
    for (let time = 0; time < 3; time += 1) {
      const answer = await readAnswer(world.services, secret);
      expect(answer!.state).toBe('usable');
      expect(answer!.sked.view.choices.accept).not.toBeNull();
    }
    expect(await everything(world)).toEqual(before);
  });

  it('a used one, an old one, a foreign one, one with a letter changed', async () => {
    const path = await accept(secret, 1);
    const before = await everything(world);
    await expect(accept(secret, 2)).rejects.toBeInstanceOf(Conflict);
    const other = await offerToGuest(world, slotIn(window, 90), { email: 'x@other.example' });
    const foreign = secretOf((await mailsTo(world, 'x@other.example'))[0]!);
    await expect(accept(foreign, 2)).rejects.toBeInstanceOf(NotFound);
    await expect(accept(secretIn(path), 1, other.id)).rejects.toBeInstanceOf(NotFound);
    const letter = secretIn(path).startsWith('A') ? 'B' : 'A';
    await expect(accept(letter + secretIn(path).slice(1), 2)).rejects.toBeInstanceOf(NotFound);
    await expect(accept('', 2)).rejects.toBeInstanceOf(NotFound);
    world.clock.nowMs = slotIn(window, 40).endMs + 15 * DAY_MS;
    await expect(accept(secretIn(path), 2)).rejects.toThrow(/too old/);
    expect((await readAnswer(world.services, secretIn(path)))!.state).toBe('expired');
    world.clock.nowMs = slotIn(window, 40).startMs - HOUR_MS;
    expect(await stateOf()).toBe('agreed');
    expect((before as { links: unknown[] }).links.length).toBeGreaterThan(0);
  });

  it('one whose page is older than the sked: the answer is refused, the link still works', async () => {
    const { withdrawSked } = await import('~/server/skeds/withdrawSked');
    const other = slotIn(window, 60);
    await moveSked(world.services, ylva(), id, {
      version: 1,
      words: '',
      start: other.startMs,
      end: other.endMs,
    });
    const refused = await accept(secret, 1).catch((error: unknown) => error);
    expect(refused).toBeInstanceOf(Conflict);
    expect((refused as Error).message).toMatch(/changed since you opened it.*QA1LUN moved it/);
    expect((await findGuestLink(world.services, secret))!.state).toBe('usable');
    await withdrawSked(world.services, ylva(), id, { version: 2, words: '' });
    await expect(accept(secret, 3)).rejects.toThrow(/taken back|withdrawn/);
    expect((await findGuestLink(world.services, secret))!.state).toBe('usable');
  });

  it('one of two pressed at once', async () => {
    const outcomes = await Promise.allSettled([
      accept(secret, 1),
      answerByLink(world.services, { secret, id }, (viewer, link) =>
        declineSked(world.services, viewer, id, { version: 1, words: '', ...link }),
      ),
    ]);
    expect(outcomes.map((outcome) => outcome.status).sort()).toEqual(['fulfilled', 'rejected']);
  });

  it('those of somebody who is locked out', async () => {
    await world.services.db
      .updateTable('person')
      .set({ locked_at: 1 })
      .where('email', '=', GUEST.email)
      .execute();
    const before = await everything(world);
    await expect(accept(secret, 1)).rejects.toBeInstanceOf(Forbidden);
    await mailFreshLink(world.services, secret);
    expect(await everything(world)).toEqual(before);
  });

  it('a spent one brings a fresh one by mail, to the same address only', async () => {
    await accept(secret, 1);
    const all = (await everything(world)) as { outbox: unknown[] };
    await mailFreshLink(world.services, secret);
    const after = (await everything(world)) as { outbox: unknown[] };
    expect(after.outbox.length).toBe(all.outbox.length + 1);
    const fresh = (await mailsTo(world, GUEST.email)).find((mail) =>
      mail.subject.startsWith('A fresh link'),
    )!;
    expect((await findGuestLink(world.services, secretOf(fresh)))!.state).toBe('usable');
    world.clock.nowMs += 60 * DAY_MS;
    await expect(mailFreshLink(world.services, secret)).rejects.toBeInstanceOf(Conflict);
    await expect(mailFreshLink(world.services, 'none')).rejects.toBeInstanceOf(NotFound);
  });
});

describe('registering with the same address', () => {
  const register = async () => {
    await registerPerson(world.services, {
      name: 'Bea',
      email: GUEST.email,
      timeZone: 'Europe/Berlin',
    });
    const mail = (await mailsTo(world, GUEST.email)).find((one) => /Confirm/.test(one.subject))!;
    return /\/confirm\/([\w-]+)/.exec(mail.text_body)![1]!;
  };

  it('takes over station and skeds; nothing typed counts before the address is confirmed', async () => {
    const confirm = await register();
    const unconfirmed = await readAnswer(world.services, secret);
    expect(unconfirmed!.person.name).toBe(GUEST.callSign);
    const person = await confirmMail(world.services, {
      secret: confirm,
      password: 'a kettle on the roof',
    });
    expect(person).toMatchObject({ name: 'Bea', time_zone: 'Europe/Berlin' });
    const [station] = await listMyStations(world.services, person);
    expect(station).toMatchObject({ callSign: GUEST.callSign, crewRole: 'keeper', listed: false });
    const { skeds } = await listSkeds(
      world.services,
      { ...ylva(), id: person.id },
      skedFilterSchema.parse({}),
    );
    expect(skeds.map((sked) => sked.id)).toEqual([id]);
    const row = await world.services.db
      .selectFrom('station')
      .select(['guest', 'listed'])
      .where('id', '=', station!.id)
      .executeTakeFirst();
    expect(row).toEqual({ guest: 0, listed: 0 });
    await expect(accept(secret, 1)).rejects.toBeInstanceOf(Conflict);
    const told = (await mailsTo(world, GUEST.email)).at(-1)!;
    expect(told.subject).toContain('in your account');
    expect(told.text_body).toContain('QZ9NEW is yours now');
    await acceptSked(
      world.services,
      { ...ylva(), id: person.id, email: GUEST.email, name: 'Bea' },
      id,
      { version: 1, words: '' },
    );
    const last = (await mailsTo(world, GUEST.email)).find((mail) => /^Agreed/.test(mail.subject))!;
    expect(last.text_body).toContain(`/skeds/${id}`);
    expect(last.unsubscribe_url).toBeNull();
  });

  it('leaves a station beside the registered one of its call sign as it is, and says so', async () => {
    await world.services.db
      .updateTable('station')
      .set({ call_sign: GUEST.callSign })
      .where('id', '=', world.stationIds['QB7TID']!)
      .execute();
    const confirm = await register();
    const person = await confirmMail(world.services, {
      secret: confirm,
      password: 'a kettle on the roof',
    });
    const own = await world.services.db
      .selectFrom('station')
      .selectAll()
      .where('guest', '=', 1)
      .executeTakeFirstOrThrow();
    expect(own.call_sign).toBe(GUEST.callSign);
    const told = (await mailsTo(world, GUEST.email)).at(-1)!;
    expect(told.text_body).toContain('registered here by somebody else');
    await expect(
      updateProfile(world.services, person, own.id, {
        version: own.version,
        note: '',
        listed: true,
      }),
    ).rejects.toBeInstanceOf(Conflict);
  });
});
