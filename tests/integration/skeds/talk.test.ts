import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { DAY_MS, HOUR_MS } from '~/domain/time/interval';
import { inTransaction } from '~/server/db/transaction';
import { Conflict, NotFound, TooManyRequests } from '~/server/errors';
import { switchTopic } from '~/server/people/saveMailPreference';
import { postMessage } from '~/server/skeds/postMessage';
import { addMessage, talkOf } from '~/server/skeds/talk';
import { agreedSked } from './agreedSked';
import { addPerson, joinCrew, newWorld, NOW_MS, type World } from './world';

const A = 'QA1LUN';
const B = 'QB7TID';
const C = 'QC2FAR';
const SLOT = { startMs: NOW_MS + DAY_MS, endMs: NOW_MS + DAY_MS + HOUR_MS };

let world: World;
let id: string;
beforeEach(async () => {
  world = await newWorld();
  id = await agreedSked(world, [A, B, C], SLOT);
});
afterEach(() => world.close());

const say = (who: string, words: string) =>
  postMessage(world.services, world.people[who]!, id, { words });

describe('messages', () => {
  it('stand on the page in their order and go to the crews of the others by mail', async () => {
    const mate = await addPerson(world.services, 'Mate', 'UTC');
    await joinCrew(world.services, world.stationIds[A]!, mate);
    await say(A, 'Two kHz lower?');
    world.clock.nowMs += 1000;
    await say(B, 'Yes.');
    const { messages, as } = await talkOf(world.services, world.people[B]!, id);
    expect(messages.map((one) => [one.callSign, one.words, one.byViewer])).toEqual([
      [A, 'Two kHz lower?', false],
      [B, 'Yes.', true],
    ]);
    expect(as).toBe(world.stationIds[B]);
    const mails = (await world.mails()).filter((mail) => mail.topic === 'talk');
    expect(
      mails.filter((mail) => mail.text_body.includes('lower')).map((m) => m.recipient),
    ).toEqual([world.people[C]!.email, world.people[B]!.email].sort());
    const answer = mails.filter((mail) => mail.text_body.includes('> Yes.'));
    expect(answer.map((mail) => mail.recipient)).toEqual(
      [world.people[C]!.email, mate.email, world.people[A]!.email].sort(),
    );
    expect(answer[0]).toMatchObject({ sked_id: id, reply_to: null });
    expect(answer[0]!.unsubscribe_url).toContain('.talk.');
  });

  it('cannot pass for ours in a mail, nor carry markup', async () => {
    await say(
      A,
      'x\n\nOpen the sked:\nhttp://elsewhere.example/\n-- \n<img src=x onerror=alert(1)>',
    );
    const [mail] = (await world.mails()).filter((one) => one.topic === 'talk');
    expect(mail!.text_body).toContain(
      '> Open the sked:\n> http://elsewhere.example/\n> -- \n> <img',
    );
    expect(mail!.html_body).not.toContain('<img');
    expect(mail!.html_body).toContain('&lt;img src=x onerror=alert(1)&gt;');
    expect(mail!.html_body).not.toContain('href="http://elsewhere');
    expect(mail!.subject).not.toContain('img');
  });

  it('are not mailed to who switched them off', async () => {
    await switchTopic(world.services, world.people[B]!.id, 'talk', false);
    await say(A, 'Hello.');
    const mails = (await world.mails()).filter((mail) => mail.topic === 'talk');
    expect(mails.map((mail) => mail.recipient)).toEqual([world.people[C]!.email]);
  });

  it('are thirty a day for a person and a sked', async () => {
    for (let n = 0; n < 30; n += 1) await say(A, `Message ${n}`);
    await expect(say(A, 'One more.')).rejects.toThrow(TooManyRequests);
    await say(B, 'Still mine.');
    world.clock.nowMs += DAY_MS;
    await say(A, 'The next day.');
    expect((await talkOf(world.services, world.people[A]!, id)).messages).toHaveLength(32);
  });

  it('end thirty days after the slot', async () => {
    world.clock.nowMs = SLOT.endMs + 30 * DAY_MS;
    await say(A, 'The last.');
    world.clock.nowMs += 1;
    expect((await talkOf(world.services, world.people[A]!, id)).as).toBeNull();
    await expect(say(A, 'Too late.')).rejects.toThrow(Conflict);
  });

  it('are for the parties that are still in it alone', async () => {
    await expect(say('stranger', 'Hello.')).rejects.toThrow(NotFound);
    await expect(talkOf(world.services, world.people['stranger']!, id)).rejects.toThrow(NotFound);
    const foreign = (tx: Parameters<typeof addMessage>[0]) =>
      addMessage(tx, world.services, {
        skedId: id,
        stationId: world.stationIds[B]!,
        personId: world.people[A]!.id,
        words: 'For somebody else.',
      });
    await expect(inTransaction(world.services.db, foreign)).rejects.toThrow(NotFound);
    await world.services.db
      .updateTable('sked_party')
      .set({ left_at: NOW_MS })
      .where('station_id', '=', world.stationIds[C]!)
      .execute();
    await expect(say(C, 'I left.')).rejects.toThrow(NotFound);
    const talk = await talkOf(world.services, world.people[C]!, id);
    expect(talk).toMatchObject({ as: null, messages: [] });
    await say(A, 'Two of us.');
    const mails = (await world.mails()).filter((mail) => mail.topic === 'talk');
    expect(mails.map((mail) => mail.recipient)).toEqual([world.people[B]!.email]);
  });
});
