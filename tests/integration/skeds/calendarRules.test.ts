import ICAL from 'ical.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { endFeed } from '~/server/feeds/endFeed';
import { listFeeds } from '~/server/feeds/listFeeds';
import { makeFeed } from '~/server/feeds/makeFeed';
import { isUnchanged, readFeed } from '~/server/feeds/readFeed';
import { skedFile } from '~/server/feeds/skedFile';
import { NotFound } from '~/server/errors';
import { acceptSked } from '~/server/skeds/acceptSked';
import { cancelSked } from '~/server/skeds/cancelSked';
import { declineSked } from '~/server/skeds/declineSked';
import { dropOutSked } from '~/server/skeds/dropOutSked';
import { lapseDueSkeds } from '~/server/skeds/lapseDueSkeds';
import { loadSked } from '~/server/skeds/load';
import { moveSked } from '~/server/skeds/moveSked';
import { withdrawSked } from '~/server/skeds/withdrawSked';
import { removeCrew } from '~/server/stations/removeCrew';
import { DAY_MS, HOUR_MS, type Interval } from '~/domain/time/interval';
import { readEntry, type Entry } from './calendarProgram';
import {
  addPerson,
  commonWindows,
  joinCrew,
  newWorld,
  NOW_MS,
  offerFrom,
  slotIn,
  type World,
} from './world';

const A = 'QA1LUN';
const B = 'QB7TID';
const C = 'QC2FAR';

interface Message {
  body: string;
  recipient: string;
  entry: Entry;
  event: ICAL.Component;
}

let world: World;
let windows: Interval[];
/** Every calendar message of lives that end in every way, in the order in which they were written. */
let messages: Message[];

function parse(body: string): ICAL.Component {
  return new ICAL.Component(ICAL.parse(body) as unknown[]);
}

beforeAll(async () => {
  world = await newWorld({ INBOUND_ADDRESS: 'replies@echotide.example' });
  windows = commonWindows([A, B, C]);
  const as = (who: string) => world.people[who]!;
  const said = (version: number) => ({ version, words: 'Größe, Würfel; “und” \\ mehr' });
  const { services } = world;
  const window = windows[0]!;
  const anna = await addPerson(services, 'Anna Ångström, Öffentlichkeitsarbeit', 'UTC');
  await joinCrew(services, world.stationIds[A]!, anna);
  const full = await offerFrom(world, A, [B, C], slotIn(window, 10));
  await acceptSked(services, as(B), full.id, said(1));
  const later = slotIn(window, 60);
  await moveSked(services, as(C), full.id, { ...said(2), start: later.startMs, end: later.endMs });
  await acceptSked(services, as(A), full.id, said(3));
  await acceptSked(services, as(B), full.id, said(4));
  await dropOutSked(services, as(A), full.id, said(5));
  await cancelSked(services, as(B), full.id, said(6));
  const declined = await offerFrom(world, A, [B], slotIn(window, 10));
  await declineSked(services, as(B), declined.id, said(1));
  const withdrawn = await offerFrom(world, A, [B], slotIn(window, 10));
  await withdrawSked(services, as(A), withdrawn.id, said(1));
  const kept = await offerFrom(world, A, [B], slotIn(windows[3]!, 10));
  await acceptSked(services, as(B), kept.id, said(1));
  await removeCrew(services, anna, world.stationIds[A]!, anna.id);
  const lapsing = await offerFrom(world, A, [B], slotIn(window, 90));
  world.clock.nowMs = slotIn(window, 90).startMs;
  expect(await lapseDueSkeds(services)).toBe(1);
  expect(lapsing.version).toBe(1);
  const rows = await services.db
    .selectFrom('outbox')
    .selectAll()
    .orderBy('rowid' as 'id')
    .execute();
  messages = rows.map((row) => {
    const body = row.calendar_body!;
    const event = parse(body).getFirstSubcomponent('vevent')!;
    return { body, recipient: row.recipient, entry: readEntry(body), event };
  });
  expect(messages.length).toBeGreaterThan(30);
});
afterAll(() => world.close());

const requests = () => messages.filter(({ entry }) => entry.method === 'REQUEST');
const cancels = () => messages.filter(({ entry }) => entry.method === 'CANCEL');
const count = (event: ICAL.Component, name: string) => event.getAllProperties(name).length;

function perPerson(): Map<string, Message[]> {
  const groups = new Map<string, Message[]>();
  for (const message of messages) {
    const key = `${message.recipient} ${message.entry.uid}`;
    groups.set(key, [...(groups.get(key) ?? []), message]);
  }
  return groups;
}

/** RFC 5545, 3.1. */
function requireContentLines(body: string): void {
  expect(body.endsWith('\r\n')).toBe(true);
  for (const line of body.slice(0, -2).split('\r\n')) {
    expect(line).not.toMatch(/[\r\n]/);
    const octets = Buffer.from(line, 'utf8');
    expect(octets.length).toBeGreaterThan(0);
    expect(octets.length).toBeLessThanOrEqual(75);
    expect(octets.toString('utf8')).toBe(line);
  }
}

describe('RFC 5545', () => {
  it('3.1: lines end with CRLF and hold at most 75 octets, folded between characters', () => {
    for (const { body } of messages) requireContentLines(body);
    expect(messages.some(({ body }) => /\r\n[ ]/.test(body))).toBe(true);
  });

  it('3.6: PRODID and VERSION once, METHOD once, one component at least', () => {
    for (const { body } of messages) {
      const calendar = parse(body);
      for (const name of ['prodid', 'version', 'method']) {
        expect(calendar.getAllProperties(name)).toHaveLength(1);
      }
      expect(calendar.getFirstPropertyValue('version')).toBe('2.0');
      expect(calendar.getAllSubcomponents()).toHaveLength(1);
    }
  });

  it('3.6.1: DTSTAMP, UID and DTSTART once, DTEND later than DTSTART, no DURATION', () => {
    for (const { event, entry } of messages) {
      for (const name of ['dtstamp', 'uid', 'dtstart', 'dtend']) expect(count(event, name)).toBe(1);
      expect(count(event, 'duration')).toBe(0);
      expect(entry.endMs).toBeGreaterThan(entry.startMs);
    }
  });

  it('3.8.7.2 and 3.3.5: DTSTAMP, DTSTART and DTEND are UTC with Z', () => {
    for (const { body } of messages) {
      for (const name of ['DTSTAMP', 'DTSTART', 'DTEND']) {
        expect(body).toMatch(new RegExp(`^${name}:\\d{8}T\\d{6}Z\\r$`, 'm'));
      }
    }
  });

  it('3.8.7.4: SEQUENCE begins with 0 and rises with every message to a person', () => {
    for (const [, group] of perPerson()) {
      const numbers = group.map(({ entry }) => entry.sequence);
      expect(numbers[0]).toBe(0);
      for (const [place, number] of numbers.entries()) {
        if (place > 0) expect(number).toBeGreaterThan(numbers[place - 1]!);
      }
    }
  });

  it('3.8.4.7: one UID for the whole life, and for each sked its own', () => {
    expect(new Set(messages.map(({ entry }) => entry.uid)).size).toBe(5);
  });

  it('3.8.1.11 and 3.8.2.7: an offer is TENTATIVE and holds nobody, an agreed slot is CONFIRMED and does', () => {
    for (const { entry } of messages) {
      expect(entry.transparent).toBe(entry.status !== 'CONFIRMED');
    }
    expect(new Set(messages.map(({ entry }) => entry.status)).size).toBe(3);
  });

  it('3.8.4.1 and 3.2.12: PARTSTAT and RSVP ask whoever has to answer, and nobody else', () => {
    const asked = messages.filter(({ entry }) => entry.rsvp === 'TRUE');
    expect(asked.length).toBeGreaterThan(5);
    for (const { entry } of messages) {
      expect(entry.partstat).toBe(entry.rsvp === 'TRUE' ? 'NEEDS-ACTION' : 'ACCEPTED');
      if (entry.rsvp === 'TRUE') expect(entry.status).toBe('TENTATIVE');
    }
  });
});

describe('RFC 5546', () => {
  it('3.2.2, REQUEST: ORGANIZER once, ATTENDEE, DTSTART, SUMMARY, and no REQUEST-STATUS', () => {
    expect(requests().length).toBeGreaterThan(20);
    for (const { event } of requests()) {
      for (const name of ['organizer', 'attendee', 'dtstart', 'summary', 'sequence']) {
        expect(count(event, name)).toBe(1);
      }
      expect(count(event, 'request-status')).toBe(0);
    }
  });

  it('3.2.2: STATUS of a REQUEST is TENTATIVE or CONFIRMED', () => {
    for (const { entry } of requests()) expect(['TENTATIVE', 'CONFIRMED']).toContain(entry.status);
  });

  it('3.2.5, CANCEL: STATUS CANCELLED, ORGANIZER, UID and a SEQUENCE above the one it cancels', () => {
    expect(cancels().length).toBeGreaterThan(8);
    for (const { event, entry } of cancels()) {
      expect(entry.status).toBe('CANCELLED');
      for (const name of ['organizer', 'uid', 'dtstamp', 'sequence', 'attendee']) {
        expect(count(event, name)).toBe(1);
      }
      expect(count(event, 'request-status')).toBe(0);
    }
    for (const [, group] of perPerson()) {
      for (const [place, { entry }] of group.entries()) {
        if (entry.method !== 'CANCEL') continue;
        expect(place).toBeGreaterThan(0);
        expect(entry.sequence).toBeGreaterThan(group[place - 1]!.entry.sequence);
      }
    }
  });

  it('3.2.3, REPLY: ORGANIZER, where the answer goes, stays the same for a UID and a person', () => {
    for (const [, group] of perPerson()) {
      expect(new Set(group.map(({ entry }) => entry.organizer)).size).toBe(1);
      expect(group[0]!.entry.organizer).toMatch(/^mailto:replies\+[a-z2-7]{26}@echotide\.example$/);
    }
    const addresses = [...perPerson().values()].map(([first]) => first!.entry.organizer);
    expect(new Set(addresses).size).toBe(perPerson().size);
  });

  it('names the recipient alone, so that nobody’s address goes to the other side', () => {
    const everybody = new Set(messages.map(({ recipient }) => recipient));
    for (const { body, recipient, entry } of messages) {
      expect(entry.attendee).toBe(`mailto:${recipient}`);
      const whole = body.replace(/\r\n /g, '');
      for (const other of everybody) {
        if (other !== recipient) expect(whole.toLowerCase()).not.toContain(other);
      }
    }
  });
});

describe('feeds', () => {
  const secretOf = (url: string) => /\/feeds\/([\w-]{43})\.ics$/.exec(url)![1]!;
  const statuses = (body: string) =>
    parse(body)
      .getAllSubcomponents('vevent')
      .map((event) => String(event.getFirstPropertyValue('status')))
      .sort();

  it('3.2.1, PUBLISH: ORGANIZER, no ATTENDEE; the UIDs and SEQUENCEs of the mails; cancelled ones too', async () => {
    const { url } = await makeFeed(world.services, world.people[A]!, { station: '' });
    const { body } = await readFeed(world.services, secretOf(url));
    requireContentLines(body);
    const calendar = parse(body);
    expect(calendar.getFirstPropertyValue('method')).toBe('PUBLISH');
    const events = calendar.getAllSubcomponents('vevent');
    // The three-party sked that A left, declined, withdrawn and lapsed; the agreed one stands.
    expect(statuses(body)).toEqual([
      'CANCELLED',
      'CANCELLED',
      'CANCELLED',
      'CANCELLED',
      'CONFIRMED',
    ]);
    const mailed = new Map(
      messages
        .filter(({ recipient }) => recipient === world.people[A]!.email)
        .map(({ entry }) => [entry.uid, entry]),
    );
    for (const event of events) {
      expect(count(event, 'attendee')).toBe(0);
      expect(count(event, 'organizer')).toBe(1);
      const own = mailed.get(String(event.getFirstPropertyValue('uid')))!;
      expect(event.getFirstPropertyValue('status')).toBe(own.status);
      const organizer = String(event.getFirstPropertyValue('organizer')).toLowerCase();
      expect(organizer).toBe(own.organizer);
      expect(Number(event.getFirstPropertyValue('sequence'))).toBeGreaterThanOrEqual(own.sequence);
    }
  });

  it('answer 304 to who has the content already, and change with the skeds', async () => {
    const { url } = await makeFeed(world.services, world.people[B]!, { station: '' });
    const first = await readFeed(world.services, secretOf(url));
    const again = await readFeed(world.services, secretOf(url));
    expect(again).toEqual(first);
    expect(isUnchanged(`"x", W/${first.etag}`, again.etag)).toBe(true);
    expect(isUnchanged(null, again.etag)).toBe(false);
    expect(isUnchanged('"x"', again.etag)).toBe(false);
    const fresh = await offerFrom(world, A, [B], slotIn(windows[2]!, 10));
    const changed = await readFeed(world.services, secretOf(url));
    expect(changed.etag).not.toBe(first.etag);
    expect(changed.lastModifiedMs).toBe(world.clock.nowMs);
    await withdrawSked(world.services, world.people[A]!, fresh.id, { version: 1, words: '' });
  });

  it('keep what was cancelled for 30 days, what was worked for 90', async () => {
    const { url } = await makeFeed(world.services, world.people[A]!, { station: '' });
    const read = async () => statuses((await readFeed(world.services, secretOf(url))).body);
    const before = world.clock.nowMs;
    const { endMs } = slotIn(windows[3]!, 10);
    world.clock.nowMs = before + 30 * DAY_MS - HOUR_MS;
    expect(await read()).toContain('CANCELLED');
    world.clock.nowMs = before + 30 * DAY_MS + HOUR_MS;
    expect(await read()).toEqual(['CONFIRMED']);
    world.clock.nowMs = endMs + 90 * DAY_MS - 1;
    expect(await read()).toEqual(['CONFIRMED']);
    world.clock.nowMs = endMs + 90 * DAY_MS;
    const { body } = await readFeed(world.services, secretOf(url));
    expect(statuses(body)).toEqual([]);
    // A calendar has one component at least (RFC 5545, 3.6).
    expect(parse(body).getAllSubcomponents()).toHaveLength(1);
    requireContentLines(body);
    world.clock.nowMs = before;
  });

  it('are private: hashed, renewed, revoked, of a station only for its crew', async () => {
    const { services } = world;
    const gone = (secret: string) =>
      expect(readFeed(services, secret)).rejects.toBeInstanceOf(NotFound);
    const viewer = world.people[C]!;
    const own = await makeFeed(services, viewer, { station: world.stationIds[C]! });
    const stored = await services.db.selectFrom('calendar_feed').selectAll().execute();
    expect(JSON.stringify(stored)).not.toContain(secretOf(own.url));
    await readFeed(services, secretOf(own.url));
    const renewed = await makeFeed(services, viewer, { station: world.stationIds[C]! });
    await gone(secretOf(own.url));
    await gone('x'.repeat(43));
    const [, listed] = await listFeeds(services, viewer);
    expect(listed).toMatchObject({ label: 'Skeds of QC2FAR', feed: { lastReadMs: null } });
    await expect(endFeed(services, world.people[A]!, listed!.feed!.id)).rejects.toThrow(NotFound);
    await endFeed(services, viewer, listed!.feed!.id);
    await gone(secretOf(renewed.url));
    const foreign = makeFeed(services, viewer, { station: world.stationIds[A]! });
    await expect(foreign).rejects.toBeInstanceOf(NotFound);

    const guest = await addPerson(services, 'Once', 'UTC');
    await joinCrew(services, world.stationIds[A]!, guest);
    const station = await makeFeed(services, guest, { station: world.stationIds[A]! });
    await readFeed(services, secretOf(station.url));
    await removeCrew(services, guest, world.stationIds[A]!, guest.id);
    await gone(secretOf(station.url));
  });

  it('one sked as a file is for the crews of its parties', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(windows[2]!, 60));
    const { fileName, body } = await skedFile(world.services, world.people[B]!, id);
    expect(fileName).toBe('sked-QA1LUN-QB7TID.ics');
    const { row } = (await loadSked(world.services.db, id))!;
    expect(readEntry(body)).toMatchObject({ method: 'PUBLISH', uid: row.uid, status: 'TENTATIVE' });
    await expect(skedFile(world.services, world.people[C]!, id)).rejects.toBeInstanceOf(NotFound);
    expect(NOW_MS).toBeLessThan(world.clock.nowMs);
  });
});
