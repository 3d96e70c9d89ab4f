import { describe, expect, it } from 'vitest';
import { buildOptions, buildProblem } from '../../../src/domain/activity/plan/options';
import { findCommonWindows } from '../../../src/domain/window';
import { HOUR_MS, MINUTE_MS } from '../../../src/domain/time/interval';
import { planWeekend } from '../../bench/planInstances';
import { SLOT_MS, threeStations } from './threeStations';

describe('the options of a wish', () => {
  it('are all the starts on the grid at which the slot lies in a common window', () => {
    const input = planWeekend(12, 'everyone');
    input.rules.leastChance = 0;
    const options = buildOptions(input);
    let compared = 0;
    input.wishes.forEach((wish, index) => {
      const stations = input.stations.filter(({ id }) => id === wish.a || id === wish.b);
      if (!stations.every(({ setups }) => setups['1296'])) return;
      const { windows } = findCommonWindows({ ...input, stations });
      const starts: number[] = [];
      for (let at = input.startMs; at + SLOT_MS <= input.endMs; at += 15 * MINUTE_MS) {
        if (windows.some(({ startMs, endMs }) => startMs <= at && at + SLOT_MS <= endMs)) {
          starts.push(at);
        }
      }
      const built = options[index]!.filter(({ band }) => band === '1296');
      const hopeless = starts.length - built.length;
      expect(built.map(({ startMs }) => startMs).every((at) => starts.includes(at))).toBe(true);
      if (hopeless === 0) compared += 1;
    });
    expect(compared).toBeGreaterThan(10);
  });

  it('leave out what has less chance, pairs that must not meet, and bands that one does not have', () => {
    const input = threeStations();
    const [all] = buildOptions(input);
    expect(new Set(all!.map(({ band }) => band))).toEqual(new Set(['432', '1296']));
    expect(all!.every(({ chance }) => Number.isInteger(Math.round(1e6 * chance) / 1e4))).toBe(true);

    const never = threeStations();
    never.stations[0]!.never = ['b'];
    expect(buildOptions(never)[0]).toEqual([]);
    expect(buildOptions(never)[1]!.length).toBeGreaterThan(0);

    const without = threeStations();
    delete without.stations[0]!.setups['432'];
    expect(new Set(buildOptions(without)[0]!.map(({ band }) => band))).toEqual(new Set(['1296']));
  });

  it('keep to the hours in which people are there and to the least elevation', () => {
    const input = threeStations();
    const before = buildOptions(input)[0]!;
    const from = before[8]!.startMs;
    input.stations[1]!.usable = [{ startMs: from, endMs: from + 2 * HOUR_MS }];
    const after = buildOptions(input)[0]!.filter(({ band }) => band === before[8]!.band);
    expect(after.map(({ startMs }) => startMs)).toEqual(
      [0, 1, 2, 3, 4, 5, 6].map((step) => from + step * 15 * MINUTE_MS),
    );
    input.rules.leastElevationDeg = 89;
    expect(buildOptions(input)[0]).toEqual([]);
  });

  it('make a problem that is the same after JSON', () => {
    const problem = buildProblem(threeStations());
    expect(JSON.parse(JSON.stringify(problem))).toEqual(problem);
  });
});
