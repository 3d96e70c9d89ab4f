import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { getWorkbench } from '~/server/activities/getWorkbench';
import { importRoster, previewRoster } from '~/server/activities/importRoster';
import { Forbidden, InvalidInput, NotFound } from '~/server/errors';
import { begin, newActivityWorld, type ActivityWorld } from './world';

let world: ActivityWorld;
let slug: string;
beforeEach(async () => {
  world = await newActivityWorld();
  ({ slug } = await begin(world));
});
afterEach(() => world.close());

const TEXT = [
  'call sign,mail,locator,bands,most contacts,coming,note',
  'QA1LUN,,,1296,8,yes,',
  'QB7TID,,,,,,',
  'QX7ARN,arno@qx7arn.example,EM17,432 1296,,,by mail',
  'QY8BUR,burr@qy8bur.example,JO20,1296,,no,',
  'QZ9CEL,,JO20,,,,no address',
  'QD5DUN,dun@@x,JO20,,,,',
  'QE6ELM,elm@qe6elm.example,,,,,',
].join('\n');

const rows = async () => {
  const { db } = world.services;
  const count = async (
    table: 'person' | 'station' | 'activity_station' | 'outbox' | 'guest_link',
  ) => (await db.selectFrom(table).selectAll().execute()).length;
  return Promise.all(
    (['person', 'station', 'activity_station', 'outbox', 'guest_link'] as const).map(count),
  );
};

describe('a roster file', () => {
  it('is shown before anything is written', async () => {
    const before = await rows();
    const { lines, problems } = await previewRoster(world.services, world.marit, slug, TEXT);
    expect(lines.map(({ callSign, kind }) => `${callSign} ${kind}`)).toEqual([
      'QA1LUN registered',
      'QB7TID registered',
      'QX7ARN guest',
      'QY8BUR guest',
    ]);
    expect(problems.map(({ line }) => line)).toEqual([6, 7, 8]);
    expect(problems[0]!.message).toMatch(/QZ9CEL is not among the listed stations.*mail/);
    expect(problems[2]!.message).toMatch(/locator is needed/);
    expect(await rows()).toEqual(before);
  });

  it('puts its right lines on the roster and asks those who have not said', async () => {
    await importRoster(world.services, world.marit, slug, TEXT);
    const { roster } = await getWorkbench(world.services, world.marit, slug);
    expect(
      roster.map(({ place, callSign, answer, bands, mostContacts, guest }) => ({
        place,
        callSign,
        answer,
        bands,
        mostContacts,
        guest,
      })),
    ).toEqual([
      {
        place: 1,
        callSign: 'QA1LUN',
        answer: 'coming',
        bands: ['1296'],
        mostContacts: 8,
        guest: false,
      },
      {
        place: 2,
        callSign: 'QB7TID',
        answer: 'waiting',
        bands: [],
        mostContacts: null,
        guest: false,
      },
      {
        place: 3,
        callSign: 'QX7ARN',
        answer: 'waiting',
        bands: ['432', '1296'],
        mostContacts: null,
        guest: true,
      },
      {
        place: 4,
        callSign: 'QY8BUR',
        answer: 'notComing',
        bands: ['1296'],
        mostContacts: null,
        guest: true,
      },
    ]);
    expect((await world.mails()).map(({ recipient }) => recipient)).toEqual([
      'arno@qx7arn.example',
      world.people['QB7TID']!.email,
    ]);
  });

  it('tells what is on the roster already, and imports nothing when nothing is right', async () => {
    await importRoster(world.services, world.marit, slug, TEXT);
    const before = await rows();
    const again = await previewRoster(world.services, world.marit, slug, TEXT);
    expect(again.lines).toEqual([]);
    expect(again.problems[0]!.message).toBe('QA1LUN is on the roster already.');
    await expect(importRoster(world.services, world.marit, slug, TEXT)).rejects.toThrow(
      InvalidInput,
    );
    expect(await rows()).toEqual(before);
  });

  it('writes nothing at all when one line fails while it is written', async () => {
    const { db } = world.services;
    await db.insertInto('mail_block').values({ email: 'burr@qy8bur.example', at: 0 }).execute();
    const before = await rows();
    await expect(importRoster(world.services, world.marit, slug, TEXT)).rejects.toThrow(
      'Line 5: burr@qy8bur.example cannot be written to. Nothing was imported.',
    );
    expect(await rows()).toEqual(before);
  });

  it('is read for the coordinator of the activity only', async () => {
    const { services, otherCoordinator, people } = world;
    await expect(previewRoster(services, otherCoordinator, slug, TEXT)).rejects.toThrow(NotFound);
    await expect(importRoster(services, people['QA1LUN']!, slug, TEXT)).rejects.toThrow(NotFound);
    await services.db.updateTable('activity').set({ state: 'published' }).execute();
    await expect(importRoster(services, otherCoordinator, slug, TEXT)).rejects.toThrow(Forbidden);
  });

  it('takes no station that is not listed by its call sign alone', async () => {
    await world.services.db.updateTable('station').set({ listed: 0 }).execute();
    const { lines, problems } = await previewRoster(
      world.services,
      world.marit,
      slug,
      'call sign\nQA1LUN',
    );
    expect(lines).toEqual([]);
    expect(problems[0]!.message).toMatch(/not among the listed stations/);
  });
});
