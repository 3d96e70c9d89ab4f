import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { giveBackByLink } from '~/server/activities/giveBackByLink';
import { publicPlan } from '~/server/activities/publicPlan';
import { publishRevision } from '~/server/activities/publishRevision';
import { getAnswerPageByLink } from '~/server/activities/getAnswerPage';
import { Conflict, NotFound } from '~/server/errors';
import { draftOf, GUEST_MAIL, mailMark, newPlanWorld, plan, type PlanWorld } from './planWorld';

let world: PlanWorld;
let secret: string;
beforeEach(async () => {
  world = await newPlanWorld();
  await plan(world);
  const since = await mailMark(world);
  await publishRevision(world.services, world.marit, world.slug, {
    version: (await draftOf(world)).row.version,
    note: '',
  });
  const mail = (await since()).find(({ recipient }) => recipient === GUEST_MAIL)!;
  [, secret = ''] = /\/roster\/([\w-]+)/.exec(mail.text_body)!;
}, 60_000);
afterEach(() => world.close());

const slots = async (own: boolean) => {
  const page = (await publicPlan(world.services, world.activityId))!;
  const guest = page.stations.findIndex(({ callSign }) => callSign === 'QX7ARN');
  return page.slots.filter(
    ({ first, second, state }) => state === 'agreed' && [first, second].includes(guest) === own,
  );
};

describe('the itinerary of somebody without an account', () => {
  it('is behind the link in the mail, and a slot is given back by it once', async () => {
    const [slot, other] = await slots(true);
    const since = await mailMark(world);
    const given = { skedId: slot!.skedId, startMs: slot!.startMs, words: '' };
    const fresh = await giveBackByLink(world.services, secret, given);
    expect((await slots(true)).map(({ skedId }) => skedId)).not.toContain(slot!.skedId);
    const told = (await since()).map(({ recipient }) => recipient);
    expect(told).toContain(world.marit.email);

    await expect(
      giveBackByLink(world.services, secret, {
        skedId: other!.skedId,
        startMs: other!.startMs,
        words: '',
      }),
    ).rejects.toThrow('This link was already used.');
    expect((await slots(true)).map(({ skedId }) => skedId)).toContain(other!.skedId);
    expect((await getAnswerPageByLink(world.services, fresh.secret, null)).link.state).toBe('open');
    await expect(giveBackByLink(world.services, fresh.secret, given)).rejects.toBeInstanceOf(
      Conflict,
    );
    expect((await getAnswerPageByLink(world.services, fresh.secret, null)).link.state).toBe('open');
  });

  it('opens no slot of others, and none that was moved unseen', async () => {
    const [foreign] = await slots(false);
    await expect(
      giveBackByLink(world.services, secret, {
        skedId: foreign!.skedId,
        startMs: foreign!.startMs,
        words: '',
      }),
    ).rejects.toBeInstanceOf(NotFound);
    const [own] = await slots(true);
    await expect(
      giveBackByLink(world.services, secret, {
        skedId: own!.skedId,
        startMs: own!.startMs + 1,
        words: '',
      }),
    ).rejects.toThrow('was moved since');
    expect((await getAnswerPageByLink(world.services, secret, null)).link.state).toBe('open');
    expect(await slots(true)).toContainEqual(own);
    expect(await slots(false)).toContainEqual(foreign);
  });
});
