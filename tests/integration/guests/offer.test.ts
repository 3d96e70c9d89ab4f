import ICAL from 'ical.js';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { Interval } from '~/domain/time/interval';
import { DAY_MS } from '~/domain/time/interval';
import { Conflict, InvalidInput, TooManyRequests } from '~/server/errors';
import { endMail, noMoreToken } from '~/server/guests/noMore';
import { NEW_ADDRESSES_A_DAY, OFFERS_A_DAY } from '~/server/guests/guestStation';
import { getSked } from '~/server/skeds/getSked';
import { skedOfferSchema } from '~/server/skeds/schemas';
import { listMyStations } from '~/server/stations/listMyStations';
import { listPublicStations, stationSearchSchema } from '~/server/stations/listPublicStations';
import { loadSearchData } from '~/server/windows/loadSearchData';
import { getPublicStation } from '~/server/stations/getStation';
import { commonWindows, newWorld, slotIn, type World } from '../skeds/world';
import { everything, GUEST, mailsTo, offerToGuest } from './world';

let world: World;
let window: Interval;

beforeEach(async () => {
  world = await newWorld();
  window = commonWindows(['QA1LUN', 'QC2FAR'])[0]!;
});
afterEach(() => world.close());

const ylva = () => world.people['QA1LUN']!;
const slot = (at = 40) => slotIn(window, at);

describe('an offer to somebody without an account', () => {
  it('goes to the address with a link, a sentence on what this is, and a way to end it', async () => {
    const { id, warnings } = await offerToGuest(world, slot(), {}, 'Shall we?');
    expect(warnings.filter((warning) => warning.includes(GUEST.callSign))).toEqual([]);
    const [mail, ...more] = await mailsTo(world, GUEST.email);
    expect(more).toEqual([]);
    expect(mail!.text_body).toContain('/answer/');
    expect(mail!.text_body).not.toContain(`/skeds/${id}`);
    expect(mail!.text_body).toMatch(/Echotide finds the hours/);
    expect(mail!.text_body).toMatch(/Ylva, QA1LUN, asked it to write to you/);
    expect(mail!.text_body).toContain('/no-more/');
    expect(mail!.unsubscribe_url).toContain('/no-more/');
    expect(mail!.topic).toBe('sked');
    const calendar = new ICAL.Component(ICAL.parse(mail!.calendar_body!) as unknown[]);
    const event = calendar.getFirstSubcomponent('vevent')!;
    expect(event.getFirstPropertyValue('status')).toBe('TENTATIVE');
    expect(event.getFirstProperty('attendee')!.getParameter('partstat')).toBe('NEEDS-ACTION');
    expect(String(event.getFirstPropertyValue('url'))).toContain('/answer/');
    const { view } = await getSked(world.services, ylva(), id);
    expect(view.parties.map((party) => party.callSign)).toEqual(['QA1LUN', GUEST.callSign]);
  });

  it('says 5 degrees, 8 to 23 by the clock of the longitude, where nothing else is said', async () => {
    await offerToGuest(world, slot(), { locator: 'QG62' }).catch(() => undefined);
    await offerToGuest(world, slot());
    const row = await world.services.db
      .selectFrom('station')
      .selectAll()
      .where('guest', '=', 1)
      .executeTakeFirstOrThrow();
    expect(JSON.parse(row.sky_json)).toEqual({ elevationFromDeg: 5 });
    expect(row.time_zone).toBe('Etc/GMT-1');
    const { weekly } = JSON.parse(row.hours_json) as { weekly: unknown[] };
    expect(weekly).toHaveLength(7);
    expect(weekly[0]).toEqual({ weekday: 1, from: '08:00', to: '23:00' });
    expect(row).toMatchObject({ listed: 0, locator: 'JO40aa' });
  });

  it('finds the same person and station again, whose corrected limits stay', async () => {
    await offerToGuest(world, slot());
    await world.services.db
      .updateTable('station')
      .set({ sky_json: '{"elevationFromDeg":12}' })
      .where('guest', '=', 1)
      .execute();
    await offerToGuest(world, slot(80), { sky: { elevationFromDeg: 3 } });
    const stations = await world.services.db
      .selectFrom('station')
      .select('sky_json')
      .where('guest', '=', 1)
      .execute();
    expect(stations).toEqual([{ sky_json: '{"elevationFromDeg":12}' }]);
  });

  it('goes to the registered station of that call sign when the address is of its crew', async () => {
    const edda = world.people['QC2FAR']!;
    const outcome = await offerToGuest(world, slot(), {
      callSign: 'QC2FAR',
      email: edda.email,
      locator: 'JO40ge',
    });
    expect(Object.keys(outcome).sort()).toEqual(['id', 'version', 'warnings']);
    expect(outcome.warnings.join()).not.toContain('QC2FAR');
    const [mail] = await mailsTo(world, edda.email);
    expect(mail!.text_body).toContain(`/skeds/${outcome.id}`);
    expect(mail!.text_body).not.toContain('/answer/');
    const guests = await world.services.db
      .selectFrom('station')
      .select('id')
      .where('guest', '=', 1)
      .execute();
    expect(guests).toEqual([]);
  });

  it('makes a station of its own for the same call sign at another address', async () => {
    const { id } = await offerToGuest(world, slot(), { callSign: 'QC2FAR', locator: 'JO40ge' });
    const [mail] = await mailsTo(world, GUEST.email);
    expect(mail!.text_body).toContain('/answer/');
    expect(await mailsTo(world, world.people['QC2FAR']!.email)).toEqual([]);
    expect(id).toBeTruthy();
  });
});

describe('refusals', () => {
  it('refuses an address that wants no mail, or is locked, in the same words', async () => {
    await offerToGuest(world, slot());
    const person = await world.services.db
      .selectFrom('person')
      .select('id')
      .where('email', '=', GUEST.email)
      .executeTakeFirstOrThrow();
    await endMail(world.services, noMoreToken(world.services.config, person.id));
    const before = await everything(world);
    const blocked = await offerToGuest(world, slot(80)).catch((error: unknown) => error);
    expect(blocked).toBeInstanceOf(InvalidInput);
    expect(await everything(world)).toEqual(before);
    await world.services.db.deleteFrom('mail_block').execute();
    await world.services.db
      .updateTable('person')
      .set({ locked_at: 1 })
      .where('id', '=', person.id)
      .execute();
    const locked = await offerToGuest(world, slot(80)).catch((error: unknown) => error);
    expect((locked as Error).message).toBe((blocked as Error).message);
    expect((locked as Error).message).toBe(`${GUEST.email} cannot be written to.`);
  });

  it('sends nothing more to an address that wants no mail', async () => {
    const { id, version } = await offerToGuest(world, slot());
    const person = await world.services.db
      .selectFrom('person')
      .select('id')
      .where('email', '=', GUEST.email)
      .executeTakeFirstOrThrow();
    await endMail(world.services, noMoreToken(world.services.config, person.id));
    const { withdrawSked } = await import('~/server/skeds/withdrawSked');
    await withdrawSked(world.services, ylva(), id, { version, words: '' });
    expect(await mailsTo(world, GUEST.email)).toHaveLength(1);
  });

  it('lets a person write to twenty new addresses a day, and to known ones without end', async () => {
    const times = Array.from({ length: NEW_ADDRESSES_A_DAY + 1 }, (_, index) => index);
    for (const index of times.slice(0, NEW_ADDRESSES_A_DAY)) {
      await offerToGuest(world, slot(), { email: `n${index}@many.example` });
    }
    const before = await everything(world);
    const refused = await offerToGuest(world, slot(), { email: 'one.more@many.example' }).catch(
      (error: unknown) => error,
    );
    expect(refused).toBeInstanceOf(TooManyRequests);
    expect((refused as Error).message).toMatch(/20 new addresses within a day.*Nothing was sent/);
    expect(await everything(world)).toEqual(before);
    await offerToGuest(world, slot(60), { email: 'n3@many.example' });
    await offerToGuest(world, slot(), { email: 'other@many.example' }, '', 'QC2FAR');
    world.clock.nowMs += DAY_MS + 1;
    const later = commonWindows(['QA1LUN', 'QC2FAR']).find(
      ({ startMs }) => startMs > world.clock.nowMs,
    )!;
    await offerToGuest(world, slotIn(later, 60), { email: 'one.more@many.example' });
  });

  it('lets five offers of one person wait for one station', async () => {
    for (let count = 0; count < 5; count += 1) await offerToGuest(world, slot(30 + count));
    await expect(offerToGuest(world, slot(90))).rejects.toBeInstanceOf(Conflict);
  });

  it('counts the offers to an address, under whatever call sign', async () => {
    for (let count = 0; count < 5; count += 1) {
      await offerToGuest(world, slot(30 + count), { callSign: `QZ9N${'ABCDE'[count]}` });
    }
    await expect(offerToGuest(world, slot(90), { callSign: 'QZ9NF' })).rejects.toThrow(
      'QZ9NF has 5 offers of yours to answer already',
    );
  });

  it('counts those that were taken back too, and the moves of one', async () => {
    const { withdrawSked } = await import('~/server/skeds/withdrawSked');
    const { moveSked, MOVES_A_DAY } = await import('~/server/skeds/moveSked');
    for (let count = 0; count < OFFERS_A_DAY - 1; count += 1) {
      const { id, version } = await offerToGuest(world, slot(30 + count));
      await withdrawSked(world.services, ylva(), id, { version, words: '' });
    }
    const { id } = await offerToGuest(world, slot(60));
    await expect(offerToGuest(world, slot(61))).rejects.toThrow(TooManyRequests);
    const move = (count: number) => {
      const { startMs: start, endMs: end } = slot(30 + count);
      return moveSked(world.services, ylva(), id, { version: count, start, end, words: '' });
    };
    for (let count = 1; count <= MOVES_A_DAY; count += 1) await move(count);
    await expect(move(MOVES_A_DAY + 1)).rejects.toThrow(TooManyRequests);
    world.clock.nowMs += DAY_MS + 1;
    await expect(move(MOVES_A_DAY + 1)).rejects.toThrow(Conflict);
  });

  it('refuses the own address, the same call sign twice, and what is no address', async () => {
    await expect(offerToGuest(world, slot(), { email: ylva().email })).rejects.toThrow(
      'That is your own address.',
    );
    await expect(offerToGuest(world, slot(), { callSign: 'QA1LUN' })).rejects.toThrow(
      'QA1LUN takes part already',
    );
    const offer = {
      station: world.stationIds['QA1LUN'],
      band: '1296',
      mode: 'cw',
      start: '2027-01-20T20:00:00Z',
      end: '2027-01-20T21:00:00Z',
    };
    for (const [guest, path, words] of [
      [{ ...GUEST, email: 'bea@x.example\r\nBcc: all@y.example' }, 'with.0.email', /mail address/],
      [{ ...GUEST, email: 'bea' }, 'with.0.email', /mail address/],
      [{ ...GUEST, callSign: '<b>' }, 'with.0.callSign', /call sign/],
      [{ ...GUEST, locator: 'ZZ99' }, 'with.0.locator', /\S/],
      [{ ...GUEST, timeZone: 'Mars/Olympus' }, 'with.0.timeZone', /time zone/],
      [{ ...GUEST, sky: { elevationFromDeg: 120 } }, 'with.0.sky.elevationFromDeg', /elevation/],
      [{ ...GUEST, name: 'x' }, 'with.0', /no field “name”/],
      [7, 'with.0', /by its id/],
    ] as const) {
      const parsed = skedOfferSchema.safeParse({ ...offer, with: [guest] });
      expect(parsed.error?.issues[0]?.path.join('.')).toBe(path);
      expect(parsed.error?.issues[0]?.message).toMatch(words);
    }
  });
});

describe('what others see of a station that was described', () => {
  it('is nothing: no list, no search, no page, no windows', async () => {
    await offerToGuest(world, slot());
    const { id } = await world.services.db
      .selectFrom('station')
      .select('id')
      .where('guest', '=', 1)
      .executeTakeFirstOrThrow();
    const page = await listPublicStations(
      world.services,
      stationSearchSchema.parse({ search: 'QZ9' }),
    );
    expect(page.stations).toEqual([]);
    for (const viewer of [null, ylva(), world.people['stranger']!]) {
      await expect(getPublicStation(world.services, viewer, id)).rejects.toThrow(/no such station/);
      for (const token of [id, GUEST.callSign]) {
        const found = await loadSearchData(world.services, viewer, [token], window);
        expect(found.stations).toEqual([]);
        expect(found.problems).toHaveLength(1);
      }
    }
    expect(await listMyStations(world.services, ylva())).toHaveLength(1);
    await expect(
      offerToGuest(world, slot(70)).then(() =>
        import('~/server/skeds/offerSked').then(({ offerSked }) =>
          offerSked(world.services, world.people['QB7TID']!, {
            station: world.stationIds['QB7TID']!,
            with: [id],
            band: '1296',
            mode: 'cw',
            start: slot().startMs,
            end: slot().endMs,
            words: '',
          }),
        ),
      ),
    ).rejects.toThrow('There is no such partner station.');
  });
});
