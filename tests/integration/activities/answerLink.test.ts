import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { DAY_MS } from '~/domain/time/interval';
import { getAnswerPageByLink } from '~/server/activities/getAnswerPage';
import { getWorkbench } from '~/server/activities/getWorkbench';
import { inviteGuest } from '~/server/activities/inviteGuest';
import { inviteStation } from '~/server/activities/inviteStation';
import { mailFreshLink } from '~/server/activities/mailFreshLink';
import { saveAnswerByLink } from '~/server/activities/saveAnswerByLink';
import { Conflict, Forbidden, InvalidInput, NotFound } from '~/server/errors';
import { answerForm, begin, END_MS, newActivityWorld, type ActivityWorld } from './world';

let world: ActivityWorld;
let slug: string;
let secret: string;
let stationId: string;

beforeEach(async () => {
  world = await newActivityWorld();
  ({ slug } = await begin(world));
  await inviteGuest(world.services, world.marit, slug, {
    callSign: 'QX7ARN',
    email: 'arno@qx7arn.example',
    locator: 'EM17',
    bands: { '1296': 'yes' },
  });
  secret = await newestSecret();
  stationId = (await getAnswerPageByLink(world.services, secret, null)).station.stationId;
});
afterEach(() => world.close());

async function newestSecret(): Promise<string> {
  const mails = await world.services.db
    .selectFrom('outbox')
    .select('text_body')
    .where('recipient', '=', 'arno@qx7arn.example')
    .orderBy('created_at')
    .orderBy('rowid' as never)
    .execute();
  return /\/roster\/([\w-]+)/.exec(mails.at(-1)!.text_body)![1]!;
}

const roster = async () => (await getWorkbench(world.services, world.marit, slug)).roster;

describe('the link in a mail to somebody without an account', () => {
  it('changes nothing by being looked at', async () => {
    const before = await world.services.db.selectFrom('guest_link').selectAll().execute();
    for (let look = 0; look < 3; look += 1) {
      const page = await getAnswerPageByLink(world.services, secret, null);
      expect(page.link.state).toBe('open');
    }
    expect(await world.services.db.selectFrom('guest_link').selectAll().execute()).toEqual(before);
    expect((await roster())[0]!.answer).toBe('waiting');
  });

  it('is stored only as a hash', async () => {
    const [row] = await world.services.db.selectFrom('guest_link').selectAll().execute();
    expect(JSON.stringify(row)).not.toContain(secret);
    expect(secret).toHaveLength(43);
  });

  it('answers once and leads to a fresh one', async () => {
    const saved = await saveAnswerByLink(world.services, secret, stationId, answerForm());
    expect(saved).toMatchObject({ callSign: 'QX7ARN', answer: 'coming' });
    expect((await roster())[0]).toMatchObject({ answer: 'coming', bands: ['1296'] });
    await expect(
      saveAnswerByLink(world.services, secret, stationId, answerForm({ answer: 'notComing' })),
    ).rejects.toThrow(Conflict);
    expect((await getAnswerPageByLink(world.services, secret, null)).link.state).toBe('used');
    await saveAnswerByLink(
      world.services,
      saved.secret,
      stationId,
      answerForm({ answer: 'notComing' }),
    );
    expect((await roster())[0]!.answer).toBe('notComing');
  });

  it('stays usable when the answer was refused', async () => {
    await expect(
      saveAnswerByLink(world.services, secret, stationId, { answer: 'coming' }),
    ).rejects.toThrow(InvalidInput);
    await saveAnswerByLink(world.services, secret, stationId, answerForm());
  });

  it('answers for no other station and no other activity', async () => {
    await inviteStation(world.services, world.marit, slug, world.stationIds['QA1LUN']!);
    await expect(
      saveAnswerByLink(world.services, secret, world.stationIds['QA1LUN']!, answerForm()),
    ).rejects.toThrow(Forbidden);
    expect((await roster()).map(({ answer }) => answer)).toEqual(['waiting', 'waiting']);
    await expect(
      saveAnswerByLink(world.services, `${secret}x`, stationId, answerForm()),
    ).rejects.toThrow(NotFound);
  });

  it('expires two weeks after the end, and takes no answer once the activity is over', async () => {
    world.clock.nowMs = END_MS;
    await expect(saveAnswerByLink(world.services, secret, stationId, answerForm())).rejects.toThrow(
      'over',
    );
    world.clock.nowMs = END_MS + 14 * DAY_MS;
    expect((await getAnswerPageByLink(world.services, secret, null)).link.state).toBe('expired');
    await expect(saveAnswerByLink(world.services, secret, stationId, answerForm())).rejects.toThrow(
      Conflict,
    );
  });

  it('is replaced by mail, to the same address only', async () => {
    await saveAnswerByLink(world.services, secret, stationId, answerForm());
    const before = (await world.mails()).length;
    await mailFreshLink(world.services, secret);
    const mails = await world.mails();
    expect(mails).toHaveLength(before + 1);
    expect(mails.every(({ recipient }) => recipient === 'arno@qx7arn.example')).toBe(true);
    const fresh = mails.find(({ subject }) => /your link/.test(subject))!;
    const [, second] = /\/roster\/([\w-]+)/.exec(fresh.text_body)!;
    await saveAnswerByLink(world.services, second!, stationId, answerForm());
  });

  it('leads nowhere when its person was locked', async () => {
    await world.services.db
      .updateTable('person')
      .set({ locked_at: 1 })
      .where('email', '=', 'arno@qx7arn.example')
      .execute();
    await expect(getAnswerPageByLink(world.services, secret, null)).rejects.toThrow(NotFound);
  });
});
