import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { wishedPairs, type StatedWish, type WishingStation } from '~/domain/activity/wishes';

const station = (
  id: string,
  place: number,
  more: Partial<WishingStation> = {},
): WishingStation => ({
  id,
  place,
  coming: true,
  bands: ['432', '1296'],
  wants: 'everyone',
  priority: 2,
  ...more,
});
const want = (stationId: string, partnerId: string, priority: 1 | 2 | 3 = 2): StatedWish => ({
  stationId,
  partnerId,
  kind: 'want',
  priority,
});
const never = (stationId: string, partnerId: string): StatedWish => ({
  ...want(stationId, partnerId),
  kind: 'never',
});

describe('wished pairs', () => {
  it('are all of those who want everyone', () => {
    const pairs = wishedPairs([station('a', 1), station('b', 2), station('c', 3)], []);
    expect(pairs.map(({ a, b }) => a + b)).toEqual(['ab', 'ac', 'bc']);
  });

  it('exist when one side wants the other, with the higher priority of both', () => {
    const list = { wants: 'list' } as const;
    const stations = [station('a', 2, list), station('b', 1, list), station('c', 3, list)];
    expect(wishedPairs(stations, [want('a', 'b', 1)])).toMatchObject([
      { a: 'b', b: 'a', priority: 1 },
    ]);
    expect(wishedPairs(stations, [want('a', 'b', 1), want('b', 'a', 3)])).toMatchObject([
      { a: 'b', b: 'a', priority: 3 },
    ]);
  });

  it('never exist when one side says never, whatever the other wants', () => {
    const stations = [station('a', 1), station('b', 2)];
    expect(wishedPairs(stations, [never('a', 'b'), want('b', 'a', 3)])).toEqual([]);
    expect(wishedPairs(stations, [never('b', 'a')])).toEqual([]);
  });

  it('leave out who is not coming, and name the bands of both', () => {
    const stations = [
      station('a', 1, { bands: ['432'] }),
      station('b', 2, { bands: ['432', '1296'] }),
      station('c', 3, { coming: false }),
    ];
    expect(wishedPairs(stations, [want('a', 'c', 3)])).toEqual([
      { a: 'a', b: 'b', priority: 2, bands: ['432'] },
    ]);
  });

  it('do not depend on the order in which stations and wishes are given', () => {
    const ids = ['a', 'b', 'c', 'd'];
    const stations = ids.map((id, index) =>
      station(id, index + 1, index % 2 ? { wants: 'list' } : {}),
    );
    const wishes = fc.array(
      fc
        .record({
          stationId: fc.constantFrom(...ids),
          partnerId: fc.constantFrom(...ids),
          kind: fc.constantFrom('want' as const, 'never' as const),
          priority: fc.constantFrom(1 as const, 2 as const, 3 as const),
        })
        .filter(({ stationId, partnerId }) => stationId !== partnerId),
    );
    fc.assert(
      fc.property(wishes, (stated) => {
        // A station says one thing of another.
        const once = [
          ...new Map(stated.map((wish) => [wish.stationId + wish.partnerId, wish])).values(),
        ];
        const pairs = wishedPairs(stations, once);
        expect(wishedPairs([...stations].reverse(), [...once].reverse())).toEqual(pairs);
        for (const { a, b } of pairs) {
          const between = once.filter(
            ({ stationId, partnerId }) =>
              (stationId === a && partnerId === b) || (stationId === b && partnerId === a),
          );
          expect(between.some(({ kind }) => kind === 'never')).toBe(false);
        }
      }),
    );
  });
});
