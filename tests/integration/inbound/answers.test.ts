import { mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { Interval } from '~/domain/time/interval';
import { InvalidInput } from '~/server/errors';
import { readInboundFolder } from '~/server/inbound/readInboundFolder';
import { receiveMail } from '~/server/inbound/receiveMail';
import { acceptSked } from '~/server/skeds/acceptSked';
import { loadSked } from '~/server/skeds/load';
import { moveSked } from '~/server/skeds/moveSked';
import { replyAddress } from '~/server/skeds/replyAddress';
import type { OutboxRow } from '~/server/db/tables';
import { calendarsAfter, readEntry } from '../skeds/calendarProgram';
import {
  addPerson,
  commonWindows,
  joinCrew,
  newWorld,
  offerFrom,
  slotIn,
  type World,
} from '../skeds/world';
import { calendarReply, wordsMail, type ReplyParts } from './letters';

const A = 'QA1LUN';
const B = 'QB7TID';
const C = 'QC2FAR';
let world: World;
let window: Interval;

beforeEach(async () => {
  world = await newWorld({ INBOUND_ADDRESS: 'replies@echotide.example' });
  window = commonWindows([A, B, C])[0]!;
});
afterEach(() => world.close());

const emailOf = (who: string) => world.people[who]!.email;
const skedOf = async (id: string) => (await loadSked(world.services.db, id))!;
const accept = (who: string, id: string, version: number) =>
  acceptSked(world.services, world.people[who]!, id, { version, words: '' });

async function addressOf(who: string, id: string): Promise<string> {
  const { row } = await skedOf(id);
  return replyAddress(world.services.config, row.uid, world.people[who]!.id)!;
}

/** The answer of somebody's calendar program to the newest message it has. */
async function reply(who: string, id: string, partstat: string, over: Partial<ReplyParts> = {}) {
  const { row } = await skedOf(id);
  const entry = calendarsAfter(await world.mails())
    .get(emailOf(who))!
    .get(row.uid)!;
  const raw = calendarReply({
    from: emailOf(who),
    to: entry.organizer.replace('mailto:', ''),
    uid: row.uid,
    sequence: entry.sequence,
    partstat,
    ...over,
  });
  return receiveMail(world.services, raw);
}

async function newMails(before: OutboxRow[]): Promise<OutboxRow[]> {
  const known = new Set(before.map((mail) => mail.id));
  return (await world.mails()).filter((mail) => !known.has(mail.id));
}

describe('answers of calendar programs', () => {
  it('are asked for at an address of each person’s own, which is organizer and reply address', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    const mails = await world.mails();
    const addresses = mails.map((mail) => readEntry(mail.calendar_body!).organizer);
    expect(new Set(addresses).size).toBe(2);
    for (const mail of mails) {
      expect(mail.reply_to).toMatch(/^replies\+[a-z2-7]{26}@echotide\.example$/);
      expect(readEntry(mail.calendar_body!).organizer).toBe(`mailto:${mail.reply_to}`);
    }
    await accept(B, id, 1);
    const after = calendarsAfter(await world.mails());
    const uid = (await skedOf(id)).row.uid;
    expect(after.get(emailOf(B))!.get(uid)!.organizer).toBe(`mailto:${await addressOf(B, id)}`);
    expect(mails.every((mail) => mail.text_body.includes('shown to the other parties'))).toBe(true);
  });

  it.each(['base64', '8bit', 'quoted-printable'] as const)(
    'accept for the station (RFC 5546, 3.2.3; %s)',
    async (encoding) => {
      const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
      expect(await reply(B, id, 'ACCEPTED', { encoding, comment: 'Gern\\, bis dann' })).toBe(
        'answered',
      );
      const { row, sked } = await skedOf(id);
      expect(row.state).toBe('agreed');
      expect(sked.parties.map((party) => party.answer)).toEqual(['accepted', 'accepted']);
      const event = await world.services.db
        .selectFrom('sked_event')
        .selectAll()
        .where('kind', '=', 'accepted')
        .executeTakeFirstOrThrow();
      expect(event).toMatchObject({ person_id: world.people[B]!.id, words: 'Gern, bis dann' });
    },
  );

  it('decline an offer, cancel an agreed sked of two, leave one of three', async () => {
    const declined = await offerFrom(world, A, [B], slotIn(window, 10));
    expect(await reply(B, declined.id, 'DECLINED')).toBe('answered');
    expect((await skedOf(declined.id)).row.state).toBe('declined');

    const cancelled = await offerFrom(world, A, [B], slotIn(window, 10));
    await accept(B, cancelled.id, 1);
    expect(await reply(A, cancelled.id, 'DECLINED')).toBe('answered');
    expect((await skedOf(cancelled.id)).row.state).toBe('cancelled');

    const three = await offerFrom(world, A, [B, C], slotIn(window, 10));
    await accept(B, three.id, 1);
    await accept(C, three.id, 2);
    expect(await reply(C, three.id, 'DECLINED')).toBe('answered');
    const { row, sked } = await skedOf(three.id);
    expect(row.state).toBe('agreed');
    expect(sked.parties.map((party) => party.left)).toEqual([false, false, true]);
  });

  it('change nothing when they say perhaps, or what is so already, and nobody is written to', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    const mails = await world.mails();
    expect(await reply(B, id, 'TENTATIVE')).toBe('noted');
    expect(await reply(B, id, 'NEEDS-ACTION')).toBe('noted');
    expect(await reply(A, id, 'ACCEPTED')).toBe('unchanged');
    expect((await skedOf(id)).row).toMatchObject({ state: 'offered', version: 1 });
    expect(await newMails(mails)).toEqual([]);
    expect(await reply(B, id, 'DECLINED')).toBe('answered');
    expect(await reply(B, id, 'DECLINED')).toBe('unchanged');
  });

  it('count once, however often they are delivered (Message-ID)', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    const messageId = '<one@somewhere.example>';
    expect(await reply(B, id, 'ACCEPTED', { messageId })).toBe('answered');
    const mails = await world.mails();
    await moveSked(world.services, world.people[A]!, id, {
      version: 2,
      words: '',
      start: slotIn(window, 60).startMs,
      end: slotIn(window, 60).endMs,
    });
    const afterMove = await world.mails();
    expect(afterMove.length).toBeGreaterThan(mails.length);
    expect(await reply(B, id, 'ACCEPTED', { messageId })).toBe('duplicate');
    expect((await skedOf(id)).row.state).toBe('offered');
    expect(await newMails(afterMove)).toEqual([]);
  });

  it('change nothing when the offer has been replaced, and say what happened since', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    await moveSked(world.services, world.people[A]!, id, {
      version: 1,
      words: '',
      start: slotIn(window, 60).startMs,
      end: slotIn(window, 60).endMs,
    });
    for (const partstat of ['ACCEPTED', 'DECLINED']) {
      const mails = await world.mails();
      expect(await reply(B, id, partstat, { sequence: 0 })).toBe('stale');
      expect((await skedOf(id)).row).toMatchObject({ state: 'offered', version: 2 });
      const [back, ...more] = await newMails(mails);
      expect(more).toEqual([]);
      expect(back).toMatchObject({ recipient: emailOf(B), topic: 'sked', sked_id: id });
      expect(back!.text_body).toContain('QA1LUN moved it to');
      expect(readEntry(back!.calendar_body!)).toMatchObject({
        method: 'REQUEST',
        sequence: 1,
        status: 'TENTATIVE',
        partstat: 'NEEDS-ACTION',
        ...slotIn(window, 60),
      });
    }
    expect(await reply(B, id, 'ACCEPTED')).toBe('answered');
  });

  it('do not undo what was agreed after the mail they answer', async () => {
    const bea = await addPerson(world.services, 'Bea', 'UTC');
    await joinCrew(world.services, world.stationIds[B]!, bea);
    world.people['Bea'] = bea;
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    await accept(B, id, 1);
    expect(await reply('Bea', id, 'DECLINED', { sequence: 0 })).toBe('stale');
    expect((await skedOf(id)).row.state).toBe('agreed');
    const [back] = (await world.mails()).filter((mail) => mail.subject.startsWith('Your answer'));
    expect(back!.text_body).toContain('Agreed:');
  });

  it('say why they cannot be, with free slots near it', async () => {
    const slot = slotIn(window, 10);
    const one = await offerFrom(world, A, [B], slot);
    const two = await offerFrom(world, C, [B], slot);
    await accept(B, one.id, 1);
    const mails = await world.mails();
    expect(await reply(B, two.id, 'ACCEPTED')).toBe('refused');
    expect((await skedOf(two.id)).row.state).toBe('offered');
    const fresh = await newMails(mails);
    expect(fresh).toHaveLength(1);
    expect(fresh[0]!.text_body).toContain('QB7TID has another agreed sked');
    expect(fresh[0]!.text_body.match(/^Free: .*UTC$/gm)).toHaveLength(3);
    expect(readEntry(fresh[0]!.calendar_body!)).toMatchObject({ partstat: 'NEEDS-ACTION' });
    const again = await reply(B, two.id, 'ACCEPTED', { messageId: '<x@y.example>' });
    expect(again).toBe('refused');
  });

  it('count only at the address that was given to that person, and only for that person', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    const mails = await world.mails();
    const of = async (over: Partial<ReplyParts>) => reply(B, id, 'ACCEPTED', over);
    expect(await of({ to: 'replies@echotide.example' })).toBe('ignored');
    expect(await of({ to: `replies+${'a'.repeat(26)}@echotide.example` })).toBe('ignored');
    expect(await of({ to: (await addressOf(B, id)).replace('echotide', 'elsewhere') })).toBe(
      'ignored',
    );
    expect(await newMails(mails)).toEqual([]);
    // A's address does not answer for B, whatever the sender calls himself.
    expect(await of({ to: await addressOf(A, id) })).toBe('refused');
    expect(await of({ attendee: 'somebody@else.example' })).toBe('refused');
    expect((await skedOf(id)).row.version).toBe(1);
    const back = await newMails(mails);
    expect(back.map((mail) => mail.recipient).sort()).toEqual([emailOf(B), emailOf(A)].sort());
    // Nobody's address is told to the other side.
    for (const mail of back) {
      const other = mail.recipient === emailOf(A) ? emailOf(B) : emailOf(A);
      expect(JSON.stringify(mail)).not.toContain(other);
    }
  });

  it('find the token where the mail server has put it', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    const address = await addressOf(B, id);
    const headers = [`X-Original-To: ${address.toUpperCase()}`];
    expect(await reply(B, id, 'ACCEPTED', { to: 'replies@echotide.example', headers })).toBe(
      'answered',
    );
  });

  it('are taken from calendars that mark them as automatic', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    const headers = ['Auto-Submitted: auto-replied'];
    expect(await reply(B, id, 'ACCEPTED', { headers })).toBe('answered');
  });
});

describe('answers in words', () => {
  it('become a message to the others, without what they quote', async () => {
    const { id } = await offerFrom(world, A, [B, C], slotIn(window, 10));
    const mails = await world.mails();
    const text = [
      'Ja, gern. Aber erst nach dem Essen.',
      '',
      'Am Mo., 18. Jan. 2027 um 19:42 Uhr schrieb Echotide <mail@echotide.example>:',
      '> QA1LUN offers a sked',
      '>',
      '-- ',
      'Edda',
    ].join('\n');
    const to = await addressOf(B, id);
    const raw = wordsMail({ from: emailOf(B), to, text, messageId: '<w@somewhere.example>' });
    expect(await receiveMail(world.services, raw)).toBe('message');
    expect(await receiveMail(world.services, raw)).toBe('duplicate');
    const rows = await world.services.db.selectFrom('sked_message').selectAll().execute();
    expect(rows).toHaveLength(1);
    expect(rows[0]).toMatchObject({
      sked_id: id,
      station_id: world.stationIds[B]!,
      person_id: world.people[B]!.id,
      words: 'Ja, gern. Aber erst nach dem Essen.',
    });
    const told = await newMails(mails);
    expect(told.map((mail) => mail.recipient).sort()).toEqual([emailOf(A), emailOf(C)].sort());
  });

  it('find their sked however the address is spelt in the settings', async () => {
    await world.close();
    world = await newWorld({ INBOUND_ADDRESS: 'Replies@Echotide.example' });
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    const raw = wordsMail({ from: emailOf(B), to: await addressOf(B, id), text: 'Gern.' });
    expect(await receiveMail(world.services, raw)).toBe('message');
  });

  it('come back with the reason when they are too long', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    const mails = await world.mails();
    const raw = wordsMail({
      from: emailOf(B),
      to: await addressOf(B, id),
      text: 'x'.repeat(1001),
    });
    expect(await receiveMail(world.services, raw)).toBe('refused');
    const back = await newMails(mails);
    expect(back.map((mail) => mail.recipient)).toEqual([emailOf(B)]);
    expect(back[0]!.text_body).toContain('under 1000 characters');
    expect(back[0]!.calendar_body).toBeNull();
  });

  it('are let go when a program wrote them, so that two programs never write to each other', async () => {
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    const before = await world.mails();
    const to = await addressOf(B, id);
    const automatic = [
      'Auto-Submitted: auto-replied',
      'Auto-Submitted: auto-generated; owner-email="x@y.example"',
      'Return-Path: <>',
      'Precedence: bulk',
      'X-Autoreply: yes',
    ];
    for (const header of automatic) {
      const raw = wordsMail({ from: emailOf(B), to, text: 'I am away.', headers: [header] });
      expect(await receiveMail(world.services, raw)).toBe('ignored');
    }
    expect(await newMails(before)).toEqual([]);
    const own = wordsMail({ from: emailOf(B), to, text: '', headers: ['Auto-Submitted: no'] });
    expect(await receiveMail(world.services, own)).toBe('ignored');
  });

  it('are refused when they are no mail', async () => {
    const noise = Buffer.from([0, 1, 2, 255, 254, 13, 10]);
    await expect(receiveMail(world.services, noise)).rejects.toBeInstanceOf(InvalidInput);
  });
});

describe('the folder of mails that came in', () => {
  it('is emptied: read ones go to cur, broken ones to failed', async () => {
    await world.close();
    world = await newWorld({
      INBOUND_ADDRESS: 'replies@echotide.example',
      INBOUND_FOLDER: '/nonexistent',
    });
    const folder = path.join(world.folder, 'inbound');
    world.services.config.inbound.folder = folder;
    expect(await readInboundFolder(world.services)).toBe(0);
    const { id } = await offerFrom(world, A, [B], slotIn(window, 10));
    const { row } = await skedOf(id);
    const put = (name: string, content: Buffer) =>
      writeFileSync(path.join(folder, 'new', name), content);
    const raw = calendarReply({
      from: emailOf(B),
      to: await addressOf(B, id),
      uid: row.uid,
      sequence: 0,
      partstat: 'ACCEPTED',
    });
    put('1.good.host', raw);
    put('2.broken.host', Buffer.from([0, 255, 13, 10]));
    put('3.large.host', Buffer.alloc(1_000_001, 'x'));
    put('.4.hidden', raw);
    mkdirSync(path.join(folder, 'new', '5.folder'));
    expect(await readInboundFolder(world.services)).toBe(4);
    const inside = (name: string) => readdirSync(path.join(folder, name)).sort();
    expect(inside('cur')).toEqual(['1.good.host:2,S']);
    expect(inside('failed')).toEqual(['2.broken.host', '3.large.host', '5.folder']);
    expect(inside('new')).toEqual(['.4.hidden']);
    expect((await skedOf(id)).row.state).toBe('agreed');
    expect(await readInboundFolder(world.services)).toBe(0);
  });
});
