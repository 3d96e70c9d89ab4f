import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { DAY_MS, HOUR_MS } from '~/domain/time/interval';
import { getSked } from '~/server/skeds/getSked';
import { listSkeds, skedFilterSchema } from '~/server/skeds/listSkeds';
import { reportSked } from '~/server/skeds/reportSked';
import { skedReportSchema } from '~/server/skeds/schemas';
import { waitsForViewer } from '~/server/skeds/waitsForViewer';
import { agreedSked } from './agreedSked';
import { newWorld, NOW_MS, type World } from './world';

const A = 'QA1LUN';
const B = 'QB7TID';
const SLOT = { startMs: NOW_MS + DAY_MS, endMs: NOW_MS + DAY_MS + HOUR_MS };

let world: World;
let id: string;
beforeEach(async () => {
  world = await newWorld();
  id = await agreedSked(world, [A, B], SLOT);
  world.clock.nowMs = SLOT.endMs + 60_000;
});
afterEach(() => world.close());

const report = async (who: string, change: Record<string, unknown>) => {
  world.clock.nowMs += 1000;
  const { view } = await getSked(world.services, world.people[who]!, id);
  const input = skedReportSchema.parse({ version: view.version, result: 'completed', ...change });
  return reportSked(world.services, world.people[who]!, id, input);
};
const viewOf = async (who: string) => (await getSked(world.services, world.people[who]!, id)).view;
const mailsTo = async (who: string) =>
  (await world.mails()).filter((mail) => mail.recipient === world.people[who]!.email);

describe('results', () => {
  it('show where the parties differ, on the page and in the list, and tell the others by mail', async () => {
    await report(A, { reportSent: '−21', reportReceived: 'R−19', words: 'Slow fading.' });
    expect((await viewOf(B)).disagreements).toEqual([]);
    const [first] = await mailsTo(B);
    expect(first!.subject).toMatch(/^QA1LUN reports: completed, /);
    expect(first!.topic).toBe('sked');
    expect(first!.text_body).toMatch(/Report sent: +−21/);
    expect(first!.text_body).toContain('> Slow fading.');
    expect(first!.text_body).toContain('Your own report is still to come');
    expect(first!.text_body).toContain(`/skeds/${id}#report`);
    expect((await waitsForViewer(world.services, world.people[B]!)).reports).toHaveLength(1);

    await report(B, { result: 'notHeard', reportReceived: '−24' });
    const sentences = [
      'QA1LUN says completed, QB7TID says not heard.',
      'QA1LUN sent −21, QB7TID received −24.',
    ];
    expect((await viewOf(A)).disagreements).toEqual(sentences);
    const filter = skedFilterSchema.parse({ when: 'past' });
    const list = await listSkeds(world.services, world.people[A]!, filter);
    const skeds =
      'skeds' in list ? list.skeds : (list as unknown as { id: string; disagreements: string[] }[]);
    expect(skeds.find((sked) => sked.id === id)!.disagreements).toEqual(sentences);
    const [told] = await mailsTo(A);
    expect(told!.text_body).toContain(sentences[0]);
    expect(told!.text_body).toContain(sentences[1]);
    expect((await waitsForViewer(world.services, world.people[B]!)).reports).toEqual([]);
  });

  it('can be corrected; the history keeps both, and the same again mails nobody', async () => {
    await report(A, { reportSent: '-21' });
    await report(B, { reportReceived: '-24' });
    await report(A, { reportSent: '-24' });
    const view = await viewOf(A);
    expect(view.disagreements).toEqual([]);
    expect(view.reports.map((one) => [one.callSign, one.reportSent])).toEqual([
      [B, ''],
      [A, '-24'],
    ]);
    expect(
      view.events.filter((event) => event.kind === 'reported').map((event) => event.words),
    ).toEqual(['Completed, sent -21.', 'Completed, received -24.', 'Completed, sent -24.']);
    const mails = await mailsTo(B);
    expect(mails.map((mail) => mail.subject.slice(0, 20)).sort()).toEqual([
      'QA1LUN now reports: ',
      'QA1LUN reports: comp',
    ]);
    await report(A, { reportSent: '-24' });
    expect(await mailsTo(B)).toHaveLength(2);
  });

  it('take reports of at most twenty characters, without line breaks', () => {
    const parse = (reportSent: string) =>
      skedReportSchema.safeParse({ version: 1, result: 'completed', reportSent });
    expect(parse('x'.repeat(21)).error?.issues[0]?.message).toBe(
      'Keep the report to 20 characters.',
    );
    expect(parse(' R-21\r\nx ').data?.reportSent).toBe('R-21 x');
  });

  it('are not repeated without end', async () => {
    for (let n = 0; n < 20; n += 1) await report(A, { words: `Try ${n}` });
    await expect(report(A, { words: 'Try 20' })).rejects.toThrow('at most 20 times a day');
    expect(await mailsTo(B)).toHaveLength(20);
  });
});
