import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { openApiDocument } from '~/server/http/openapi';
import { outlookAnswer, outlookAnswerSchema } from '~/server/outlook/outlookApi';
import { outlookPage } from '~/server/outlook/outlookPage';
import { newWorld, setSky, type World } from '../skeds/world';

let world: World;
beforeEach(async () => {
  world = await newWorld();
});
afterEach(() => world.close());

const page = (query: string) => outlookPage(world.services, null, new URLSearchParams(query));
const hours = async (query: string) =>
  (await page(query)).year!.days.reduce((sum, day) => sum + day.commonHours, 0);

describe('the year ahead', () => {
  it('of two stations counts what their skies allow', async () => {
    const { year, problems } = await page('here=qa1lun&there=QB7TID&band=1296');
    expect(problems).toEqual([]);
    expect([year!.here.name, year!.there.name]).toEqual(['QA1LUN', 'QB7TID']);
    expect(year!.days).toHaveLength(365);
    expect(year!.best).toHaveLength(12);
    const before = await hours('here=QA1LUN&there=QB7TID');
    await setSky(world.services, world.stationIds['QA1LUN']!, { elevationFromDeg: 45 });
    const after = await hours('here=QA1LUN&there=QB7TID');
    expect(after).toBeGreaterThan(0);
    expect(after).toBeLessThan(0.8 * before);
  });

  it('is computed once for the same two skies, and anew when one changes', async () => {
    const query = 'here=QA1LUN&there=QB7TID&band=432';
    const days = async () => (await page(query)).year!.days;
    const first = await days();
    expect(await days()).toBe(first);
    expect((await page('here=QA1LUN&there=QB7TID&band=1296')).year!.days).not.toBe(first);
    await setSky(world.services, world.stationIds['QA1LUN']!, { elevationFromDeg: 30 });
    expect(await days()).not.toBe(first);
  });

  it('takes a region at one end and a place at the other', async () => {
    const { year } = await page('here=oceania&there=jo97ee');
    expect(year!.here).toMatchObject({ name: 'Oceania', token: null });
    expect(year!.there).toMatchObject({ name: 'JO97ee', token: 'jo97ee' });
    expect(year!.best.length).toBeGreaterThan(0);
  });

  it.each([
    ['here=QZ9NIL&there=Africa', /no listed station “QZ9NIL”/],
    ['here=QA1LUN&there=qa1lun', /QA1LUN stands at both ends/],
  ])('of %s says what is wrong and computes nothing', async (query, sentence) => {
    const { year, problems } = await page(query);
    expect(year).toBeNull();
    expect(problems.join(' ')).toMatch(sentence);
  });

  it('comes as JSON in the shape that the description tells', async () => {
    const answer = await outlookAnswer(
      world.services,
      null,
      new URLSearchParams('here=Europe&there=East Asia&band=432&from=2027-03-01'),
    );
    expect(outlookAnswerSchema.parse(answer)).toEqual(answer);
    expect(answer.days[0]!.date).toBe('2027-03-01');
    expect(answer.weekends[0]!.reason).toMatch(/^Moon .* common; the Sun .*° away\.$/);
    const refused = outlookAnswer(world.services, null, new URLSearchParams('band=7'));
    await expect(refused).rejects.toThrow('“7” is not a band here');
    expect(JSON.stringify(openApiDocument())).toContain('/api/v1/outlook');
  });
});
