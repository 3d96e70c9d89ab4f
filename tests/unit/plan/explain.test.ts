import { describe, expect, it } from 'vitest';
import { planOf } from '../../../src/domain/activity/plan/answer';
import { explainLeftOut } from '../../../src/domain/activity/plan/explain';
import { greedyBoard } from '../../../src/domain/activity/plan/greedy';
import { layGrid } from '../../../src/domain/activity/plan/grid';
import type { PlanInput } from '../../../src/domain/activity/plan/input';
import { buildOptions, buildProblem } from '../../../src/domain/activity/plan/options';
import { HOUR_MS } from '../../../src/domain/time/interval';
import { planWeekend } from '../../bench/planInstances';
import { SLOT_MS, middleStart, threeStations } from './threeStations';

const start = middleStart(threeStations());

/** What is said about A and B when nothing is in the plan. */
function why(change: (input: PlanInput) => void) {
  const input = threeStations();
  input.wishes.length = 1;
  change(input);
  return explainLeftOut(input, [])[0]!;
}

describe('why a wish is left out', () => {
  it('names the Moon, with the elevation that it does not reach', () => {
    const low = why(({ rules }) => (rules.leastElevationDeg = 75));
    expect(low).toMatchObject({ reason: 'noMoon', possibleStarts: 0 });
    expect(low.sentence).toBe('The Moon is never above 75° for both.');
    const far = why(({ stations }) => {
      stations[0]!.site = { latitudeDeg: 89, longitudeDeg: 0, heightM: 0 };
      stations[1]!.site = { latitudeDeg: -89, longitudeDeg: 0, heightM: 0 };
    });
    expect(far.sentence).toBe('The Moon is never above both horizons at once.');
    expect(far.remedies).toEqual([]);
  });

  it('names what hides it', () => {
    const blocked = [
      {
        azimuthFromDeg: 0,
        azimuthToDeg: 359.9,
        elevationFromDeg: 0,
        elevationToDeg: 90,
        name: 'barn',
      },
    ];
    const { reason, sentence } = why(({ stations }) => (stations[0]!.sky.blocked = blocked));
    expect(reason).toBe('noMoon');
    expect(sentence).toMatch(/always hidden: QA1ABC’s barn alone takes/);
  });

  it('names hours, bands, length and chance', () => {
    const asleep = why(({ stations }) => (stations[1]!.usable = []));
    expect(asleep.reason).toBe('noHours');
    expect(asleep.sentence).toMatch(/clear for both for .* only while somebody sleeps or is away/);
    const band = why(({ stations }) => (stations[1]!.setups = {}));
    expect(band).toMatchObject({ reason: 'noBand' });
    expect(band.sentence).toBe('QB1ABC has no equipment on 432 MHz or 1296 MHz.');
    const short = why(
      ({ stations }) => (stations[1]!.usable = [{ startMs: start, endMs: start + SLOT_MS / 2 }]),
    );
    expect(short.reason).toBe('noWindow');
    expect(short.sentence).toBe(
      'The longest common window is 15 min, shorter than a slot of 30 min.',
    );
    const weak = why(({ stations, wishes }) => {
      wishes[0]!.bands = ['1296'];
      stations[0]!.setups['1296']!.powerAtFeedW = 0.02;
    });
    expect(weak.reason).toBe('lowChance');
    const never = why(({ stations }) => (stations[0]!.never = ['b']));
    expect(never).toMatchObject({ reason: 'never', remedies: [] });
  });

  it('counts the starts that are taken', () => {
    const input = threeStations();
    input.stations.forEach((station) => {
      station.usable = [{ startMs: start, endMs: start + SLOT_MS }];
    });
    const [left] = explainLeftOut(input, [{ wishId: 'ac', band: '432', startMs: start }]).filter(
      ({ wishId }) => wishId === 'ab',
    );
    expect(left).toMatchObject({ reason: 'taken', possibleStarts: 2 });
    expect(left!.sentence).toBe('2 starts possible, all taken by earlier wishes.');
    expect(left!.remedies.map(({ kind }) => kind)).not.toContain('moreHours');
  });

  it('names the station that has enough, and the rest that it needs', () => {
    const input = threeStations();
    input.stations[0]!.most = 1;
    const slots = [{ wishId: 'ac', band: '432', startMs: start }];
    const [full] = explainLeftOut(input, slots);
    expect(full).toMatchObject({ wishId: 'ab', reason: 'tooMany' });
    expect(full!.sentence).toBe('QA1ABC has 1 contact already, as many as it wants.');
    expect(full!.remedies[0]).toMatchObject({ kind: 'oneMore' });

    const tired = threeStations();
    tired.rules.mostInARow = 1;
    tired.stations[0]!.usable = [{ startMs: start, endMs: start + 2 * SLOT_MS }];
    tired.wishes.forEach((wish) => (wish.bands = ['432']));
    const [rest] = explainLeftOut(tired, slots);
    expect(rest).toMatchObject({ wishId: 'ab', reason: 'rest' });
    expect(rest!.sentence).toBe(
      '3 starts possible: 2 taken by earlier wishes, at 1 somebody would have more than 1 contact in a row.',
    );
  });
});

describe('what would let a wish in', () => {
  it('is true when it is done', () => {
    const input = threeStations();
    input.wishes.length = 1;
    input.stations[0]!.usable = [{ startMs: start - 4 * HOUR_MS, endMs: start }];
    input.stations[1]!.usable = [{ startMs: start, endMs: start + 4 * HOUR_MS }];
    const [left] = explainLeftOut(input, []);
    expect(left!.reason).toBe('noHours');
    expect(left!.remedies.filter(({ kind }) => kind === 'moreHours')).toHaveLength(2);
    input.stations[0]!.usable[0]!.endMs += HOUR_MS;
    expect(buildOptions(input)[0]!.length).toBeGreaterThan(0);
  });

  it('may be a lower limit, another band, or less chance', () => {
    const lower = why(({ rules }) => (rules.leastElevationDeg = 58));
    expect(lower.remedies.map(({ kind }) => kind)).toContain('lowerElevation');
    const band = why(({ wishes, stations }) => {
      wishes[0]!.bands = ['432'];
      delete stations[0]!.setups['432'];
    });
    expect(band.remedies[0]!.sentence).toMatch(/^On 1296 MHz it fits/);
    const chance = why(({ rules }) => (rules.leastChance = 1.1));
    expect(chance.remedies[0]!.sentence).toMatch(/^With a chance of \d+ % it fits/);
  });

  it('may be another slot moved out of the way', () => {
    const input = threeStations();
    input.stations[0]!.usable = [{ startMs: start, endMs: start + 2 * SLOT_MS }];
    input.stations[1]!.usable = [{ startMs: start, endMs: start + SLOT_MS }];
    input.wishes.forEach((wish) => (wish.bands = ['432']));
    const [left] = explainLeftOut(input, [{ wishId: 'ac', band: '432', startMs: start }]);
    expect(left).toMatchObject({ wishId: 'ab', reason: 'taken' });
    expect(left!.remedies[0]!.sentence).toMatch(/when QA1ABC – QC1ABC moves to/);
  });
});

describe('an activity that asks for the impossible', () => {
  it('gets a sentence for every wish that is left out', () => {
    const input = planWeekend(20, 'everyone');
    input.rules.leastElevationDeg = 12;
    input.stations.forEach((station) => (station.most = 5));
    const grid = layGrid(buildProblem(input));
    const plan = planOf(grid, greedyBoard(grid).chosen, null);
    const left = explainLeftOut(input, plan.slots);
    expect(left).toHaveLength(input.wishes.length - plan.slots.length);
    expect(left.length).toBeGreaterThan(100);
    for (const { sentence, remedies, reason } of left) {
      expect(sentence).toMatch(/^[A-Z0-9].*\.$/);
      expect(reason).not.toBe('free');
      for (const remedy of remedies) expect(remedy.sentence).toMatch(/^[A-Z].*\.$/);
    }
    expect(new Set(left.map(({ reason }) => reason)).size).toBeGreaterThan(3);
  });
});
