import { describe, expect, it } from 'vitest';
import type { PlanProblem, PlanSlot } from '~/domain/activity/plan/types';
import { PLAN_WEIGHTS } from '~/domain/activity/plan/types';
import { obstaclesOf, obstacleWords, optionAt, placesOf } from '~/domain/activity/timetable';
import { HOUR_MS, MINUTE_MS } from '~/domain/time/interval';

// Sat 13 Feb 2027 00:00 UTC
const START_MS = Date.UTC(2027, 1, 13);
const at = (hours: number) => START_MS + hours * HOUR_MS;

/** Four stations, every pair a wish named by its indexes, starts every half hour for a day on two bands. */
function problem(change: Partial<PlanProblem> = {}): PlanProblem {
  const options = ['432', '1296'].flatMap((band) =>
    Array.from({ length: 47 }, (_, step) => ({ band, startMs: at(step / 2), chance: 0.5 })),
  );
  const pairs = [0, 1, 2, 3].flatMap((a) => [0, 1, 2, 3].filter((b) => b > a).map((b) => [a, b]));
  return {
    startMs: START_MS,
    endMs: at(24),
    gridMinutes: 30,
    slotMinutes: 30,
    bandChangeMinutes: 45,
    mostInARow: 2,
    leastPauseMinutes: 30,
    stations: ['QA1LUN', 'QB7TID', 'QC2ALP', 'QD9PLN'].map((callSign) => ({
      id: callSign.toLowerCase(),
      callSign,
      most: 9,
    })),
    wishes: pairs.map(([a, b]) => ({ id: `${a}${b}`, a: a!, b: b!, priority: 2, options })),
    pinned: [],
    keep: [],
    weights: PLAN_WEIGHTS,
    ...change,
  };
}

const slot = (wishId: string, hours: number, band = '1296'): PlanSlot => ({
  wishId,
  band,
  startMs: at(hours),
});

const kinds = (from: PlanProblem, slots: PlanSlot[], candidate: PlanSlot) =>
  obstaclesOf(from, slots, candidate).map(({ kind, station }) => `${kind} ${station}`);

describe('what stands against a slot', () => {
  it('is nothing where both stations are free', () => {
    expect(kinds(problem(), [slot('23', 10)], slot('01', 10))).toEqual([]);
  });

  it('is a slot of either station at that time, not one that begins as it ends', () => {
    expect(kinds(problem(), [slot('02', 10)], slot('01', 10))).toEqual(['taken 0']);
    expect(kinds(problem(), [slot('12', 10)], slot('01', 10))).toEqual(['taken 1']);
    expect(kinds(problem(), [slot('02', 10)], slot('01', 10.5))).toEqual([]);
    expect(kinds(problem({ slotMinutes: 60 }), [slot('02', 10)], slot('01', 9.5))).toEqual([
      'taken 0',
    ]);
  });

  it('is the time for changing bands, before and after', () => {
    const plan = [slot('02', 10, '432')];
    expect(kinds(problem(), plan, slot('01', 10.5))).toEqual(['bandChange 0']);
    expect(kinds(problem(), plan, slot('01', 9.5))).toEqual(['bandChange 0']);
    expect(kinds(problem(), plan, slot('01', 11))).toEqual(['bandChange 0']);
    expect(kinds(problem(), plan, slot('01', 11.5))).toEqual([]);
  });

  it('is the rest that a station needs, whichever end the slot is put to', () => {
    const plan = [slot('02', 10), slot('03', 10.5)];
    expect(kinds(problem(), plan, slot('01', 11))).toEqual(['rest 0']);
    expect(kinds(problem(), plan, slot('01', 9.5))).toEqual(['rest 0']);
    expect(kinds(problem(), plan, slot('01', 11.5))).toEqual([]);
    const apart = [slot('02', 10), slot('03', 11)];
    expect(kinds(problem(), apart, slot('01', 10.5))).toEqual(['rest 0']);
    expect(kinds(problem({ mostInARow: 0 }), plan, slot('01', 11))).toEqual([]);
  });

  it('is the most contacts that a station wants', () => {
    const few = problem();
    few.stations[1]!.most = 1;
    expect(kinds(few, [slot('12', 3)], slot('01', 10))).toEqual(['tooMany 1']);
  });

  it('is never the slot that is being moved', () => {
    expect(kinds(problem(), [slot('01', 10)], slot('01', 10))).toEqual([]);
  });

  it('is told in words with the partner and the time', () => {
    const from = problem();
    const [taken] = obstaclesOf(from, [slot('02', 21)], slot('01', 21));
    expect(obstacleWords(from, taken!)).toBe('QA1LUN has QC2ALP then, Sat 13 Feb 21:00–21:30 UTC.');
    const [change] = obstaclesOf(from, [slot('12', 20.5, '432')], slot('01', 21));
    expect(obstacleWords(from, change!)).toBe(
      'QB7TID needs 45 min to change bands from or to QC2ALP, Sat 13 Feb 20:30–21:00 UTC.',
    );
  });
});

describe('the places of a wish', () => {
  it('are all its starts, each with what stands against it', () => {
    const places = placesOf(problem(), [slot('02', 10)], '01');
    expect(places).toHaveLength(94);
    const blocked = places.filter(({ obstacles }) => obstacles.length > 0);
    expect(blocked.every(({ startMs }) => Math.abs(startMs - at(10)) <= 75 * MINUTE_MS)).toBe(true);
    expect(blocked.filter(({ band }) => band === '1296').map(({ startMs }) => startMs)).toEqual([
      at(10),
    ]);
  });

  it('are none for a wish that is not there, nor where the sky has no option', () => {
    expect(placesOf(problem(), [], '99')).toEqual([]);
    expect(optionAt(problem(), slot('01', 10.25))).toBeNull();
    expect(optionAt(problem(), slot('01', 10))).toMatchObject({ chance: 0.5 });
  });
});
