import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  changesAnything,
  diffOfStation,
  diffRevisions,
  overlapsOf,
  slotKey,
  type RevisionSlot,
} from '~/domain/activity/revision';
import { HOUR_MS, MINUTE_MS } from '~/domain/time/interval';

const STATIONS = ['a', 'b', 'c', 'd'];

function slot(stationA: string, stationB: string, hour: number, band = '1296'): RevisionSlot {
  return {
    stationA,
    stationB,
    band: band as RevisionSlot['band'],
    startMs: hour * HOUR_MS,
    endMs: hour * HOUR_MS + 30 * MINUTE_MS,
    pinned: false,
    priority: 2,
    chance: 0.5,
    marginDb: 3,
  };
}

const anyPlan = fc
  .uniqueArray(
    fc.record({
      a: fc.integer({ min: 0, max: 2 }),
      b: fc.integer({ min: 1, max: 3 }),
      hour: fc.integer({ min: 0, max: 8 }),
      band: fc.constantFrom('432', '1296'),
    }),
    { selector: ({ a, b, band }) => `${a} ${b} ${band}`, maxLength: 12 },
  )
  .map((all) =>
    all
      .filter(({ a, b }) => a < b)
      .map(({ a, b, hour, band }) => slot(STATIONS[a]!, STATIONS[b]!, hour, band)),
  );

describe('the difference of two revisions', () => {
  it('knows a contact by its pair and band, whenever it takes place', () => {
    const before = [slot('a', 'b', 1), slot('a', 'c', 2), slot('b', 'c', 3)];
    const after = [slot('a', 'b', 1), slot('a', 'c', 5), slot('c', 'd', 2)];
    const diff = diffRevisions(before, after);
    expect(diff.kept).toEqual([after[0]]);
    expect(diff.moved).toEqual([{ before: before[1], after: after[1] }]);
    expect(diff.added).toEqual([after[2]]);
    expect(diff.removed).toEqual([before[2]]);
  });

  it('gives a station only what it takes part in', () => {
    const diff = diffRevisions(
      [slot('a', 'b', 1), slot('b', 'c', 3)],
      [slot('a', 'b', 2), slot('c', 'd', 4)],
    );
    expect(changesAnything(diffOfStation(diff, 'a'))).toBe(true);
    expect(diffOfStation(diff, 'a').added).toEqual([]);
    expect(diffOfStation(diff, 'd').removed).toEqual([]);
    expect(diffOfStation(diff, 'c').removed).toHaveLength(1);
  });

  it('accounts for every slot of both, once', () => {
    fc.assert(
      fc.property(anyPlan, anyPlan, (before, after) => {
        const diff = diffRevisions(before, after);
        const newer = [...diff.kept, ...diff.added, ...diff.moved.map((one) => one.after)];
        const older = [...diff.kept, ...diff.removed, ...diff.moved.map((one) => one.before)];
        expect(newer.map(slotKey).sort()).toEqual(after.map(slotKey).sort());
        expect(older.map(slotKey).sort()).toEqual(before.map(slotKey).sort());
      }),
    );
  });

  it('is empty against itself, and the other way round with before and after changed', () => {
    fc.assert(
      fc.property(anyPlan, anyPlan, (one, other) => {
        expect(changesAnything(diffRevisions(one, one))).toBe(false);
        const there = diffRevisions(one, other);
        const back = diffRevisions(other, one);
        expect(back.added).toEqual(there.removed);
        expect(back.moved.map(({ after }) => after)).toHaveLength(there.moved.length);
      }),
    );
  });
});

describe('overlaps of a plan', () => {
  it('are found at the station that has both', () => {
    const first = slot('a', 'b', 1);
    const second = { ...slot('a', 'c', 1), startMs: first.endMs - 1, endMs: first.endMs + HOUR_MS };
    expect(overlapsOf([second, first])).toEqual([{ stationId: 'a', first, second }]);
  });

  it('are none where a slot begins as another ends', () => {
    const first = slot('a', 'b', 1);
    expect(overlapsOf([first, { ...slot('a', 'c', 1), startMs: first.endMs }])).toEqual([]);
  });
});
