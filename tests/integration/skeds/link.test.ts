import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { middleOfSlot, skedLink } from '~/domain/sked/link';
import { skedSheet } from '~/domain/sked/sheet';
import { judgeOf } from '~/domain/window/judge';
import { getSked } from '~/server/skeds/getSked';
import { moveChoices } from '~/server/skeds/moveChoices';
import { commonWindows, giveBand, newWorld, offerFrom, SETUP, slotIn, type World } from './world';

const A = 'QA1LUN';
const B = 'QB7TID';

let world: World;
let skedId: string;
beforeEach(async () => {
  world = await newWorld();
  skedId = (await offerFrom(world, A, [B], slotIn(commonWindows([A, B])[0]!, 5))).id;
});
afterEach(() => world.close());

const seenBy = (who: string) => getSked(world.services, world.people[who]!, skedId);

describe('the link of a sked', () => {
  it('says whose equipment is missing, and the Moon is judged by degradation', async () => {
    await giveBand(world, A, SETUP);
    const { view, stations, judged } = await seenBy(A);
    expect(skedLink(judged, view)).toEqual({
      why: 'There is no margin yet: no equipment on 1296 MHz is known of QB7TID.',
    });
    const judge = judgeOf(judged, view.frequencyMhz, view.mode);
    const { rows } = skedSheet(stations, view, judge);
    expect(rows.every(({ quality }) => quality.basis === 'degradation')).toBe(true);
    expect(rows[0]!.quality.db).toBeCloseTo(rows[0]!.degradationDb, 9);
  });

  it('shows each party both ledgers in the middle of the slot, its own station first', async () => {
    await giveBand(world, A, SETUP);
    await giveBand(world, B, { ...SETUP, powerAtFeedW: 75 });
    for (const [who, partner] of [
      [A, B],
      [B, A],
    ] as const) {
      const { view, stations, judged } = await seenBy(who);
      const link = skedLink(judged, view);
      if (!('sheets' in link)) throw new Error(link.why);
      const { sheets } = link;
      expect(sheets.timeMs).toBe(middleOfSlot(view));
      expect(sheets.directions.map(({ from, to }) => [from, to])).toEqual([
        [who, partner],
        [partner, who],
      ]);
      expect(sheets.weaker).toBe('The weaker direction decides: QB7TID to QA1LUN.');
      const [there, back] = sheets.directions;
      expect(Math.abs(there.margin.db - back.margin.db)).toBeCloseTo(10 * Math.log10(2), 1);

      const sheet = skedSheet(stations, view, judgeOf(judged, view.frequencyMhz, view.mode));
      const least = Math.min(there.margin.db, back.margin.db);
      const middle = sheet.rows.reduce((near, row) =>
        Math.abs(row.timeMs - sheets.timeMs) < Math.abs(near.timeMs - sheets.timeMs) ? row : near,
      );
      expect(middle.quality.basis).toBe('margin');
      expect(Math.abs(middle.quality.db - least)).toBeLessThan(0.1);
      expect(sheet.best!.quality.db).toBeGreaterThan(least - 0.05);
    }
  });

  it('shows a round of three every direction, and the ledgers of its weakest pair or of two named', async () => {
    await giveBand(world, A, SETUP);
    await giveBand(world, B, { ...SETUP, powerAtFeedW: 75 });
    const { view, judged } = await seenBy(A);
    const third = { callSign: 'QK3OSL', site: { ...judged[0]!.site, latitudeDeg: 52 } };
    const round = [...judged, { ...third, setup: { ...SETUP, powerAtFeedW: 20 } }];
    const link = skedLink(round, view);
    if (!('sheets' in link)) throw new Error(link.why);
    const { matrix, pair } = link.round!;
    expect(matrix.callSigns).toEqual([A, B, 'QK3OSL']);
    for (const [first, second] of [
      [0, 1],
      [0, 2],
      [1, 2],
    ] as const) {
      const alone = skedLink([round[first]!, round[second]!], view);
      if (!('sheets' in alone)) throw new Error(alone.why);
      expect(alone.round).toBeNull();
      const [there, back] = alone.sheets.directions;
      expect(matrix.cells[first]![second]).toEqual({ margin: there.margin });
      expect(matrix.cells[second]![first]).toEqual({ margin: back.margin });
      const named = skedLink(round, view, [round[second]!.callSign, round[first]!.callSign]);
      expect(named).toMatchObject({ sheets: alone.sheets, round: { pair: { first, second } } });
    }
    const margins = matrix.cells
      .flat()
      .map((cell) => (cell && 'margin' in cell ? cell.margin.db : 99));
    const { from, to } = matrix.weakest!;
    expect(Math.min(...margins)).toBe(margins[from * 3 + to]);
    expect(from).toBe(2);
    expect([pair.first, pair.second]).toEqual([from, to].sort());
    expect(matrix.sentence).toContain(`The weakest of 6 directions decides: QK3OSL to `);
  });

  it('shows a round what is known of it while somebody’s equipment is missing', async () => {
    await giveBand(world, A, SETUP);
    await giveBand(world, B, SETUP);
    const { view, judged } = await seenBy(A);
    const bare = { callSign: 'QK3OSL', site: judged[0]!.site, setup: null };
    const link = skedLink([...judged, bare], view, ['QK3OSL', A]);
    if (!('sheets' in link)) throw new Error(link.why);
    expect(link.sheets.directions[0].from).toBe(A);
    expect(link.round!.matrix.cells[2]).toEqual([
      { why: 'no equipment' },
      { why: 'no equipment' },
      null,
    ]);
    expect(link.round!.matrix.sentence).toMatch(/^The weakest of the 2 directions known, of 6, /);
    const lonely = skedLink([judged[0]!, bare, { ...bare, callSign: 'QB4NIL' }], view);
    expect(lonely).toEqual({
      why: 'There is no margin yet: no equipment on 1296 MHz is known of QK3OSL and QB4NIL.',
    });
    const crowd = Array.from({ length: 7 }, (_, n) => ({ ...judged[0]!, callSign: `QA${n}LUN` }));
    expect(skedLink(crowd, view)).toEqual({ why: 'Margins are computed for up to 6 stations.' });
  });

  it('judges the windows to which it can be moved by margin too', async () => {
    await giveBand(world, A, SETUP);
    await giveBand(world, B, SETUP);
    const { view, stations, judged } = await seenBy(A);
    const judge = judgeOf(judged, view.frequencyMhz, view.mode);
    const choices = await moveChoices(world.services, stations, view, judge);
    expect(choices.length).toBeGreaterThan(0);
    expect(choices.every(({ quality }) => quality.basis === 'margin')).toBe(true);
  });
});
