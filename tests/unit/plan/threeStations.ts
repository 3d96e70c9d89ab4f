import type { PlanInput, PlanInputStation } from '../../../src/domain/activity/plan/input';
import { buildOptions } from '../../../src/domain/activity/plan/options';
import type { LinkSetup } from '../../../src/domain/link/setup';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '../../../src/domain/time/interval';

const DAY = Date.UTC(2027, 1, 13);
export const SLOT_MS = 30 * MINUTE_MS;

function dish(diameterM: number): LinkSetup {
  return {
    antenna: { kind: 'dish', diameterM, apertureEfficiency: 0.55 },
    polarization: 'rightCircular',
    powerAtFeedW: 400,
    receive: { kind: 'measured', systemTemperatureK: 80 },
  };
}

function station(id: string, latitudeDeg: number, longitudeDeg: number): PlanInputStation {
  return {
    id,
    callSign: `Q${id.toUpperCase()}1ABC`,
    site: { latitudeDeg, longitudeDeg, heightM: 100 },
    sky: { elevationFromDeg: 5 },
    setups: { '432': dish(9), '1296': dish(4) },
    most: 10,
    never: [],
  };
}

/** Three neighbours who want each other on either band; the Moon is high and everybody is awake. */
export function threeStations(): PlanInput {
  return {
    startMs: DAY,
    endMs: DAY + DAY_MS,
    rules: {
      gridMinutes: 15,
      slotMinutes: 30,
      bandChangeMinutes: 15,
      mostInARow: 0,
      leastPauseMinutes: 30,
      leastElevationDeg: 0,
      leastChance: 0.1,
    },
    bands: [
      { id: '432', label: '432 MHz', frequencyMhz: 432.1, mode: 'q65-60b' },
      { id: '1296', label: '1296 MHz', frequencyMhz: 1296.1, mode: 'q65-60c' },
    ],
    stations: [station('a', 57, 12), station('b', 55, 15), station('c', 53, 10)],
    wishes: [
      { id: 'ab', a: 'a', b: 'b', priority: 2, bands: ['432', '1296'] },
      { id: 'ac', a: 'a', b: 'c', priority: 2, bands: ['432', '1296'] },
      { id: 'bc', a: 'b', b: 'c', priority: 2, bands: ['432', '1296'] },
    ],
  };
}

/** A start in the middle of the hours that all three have in common. */
export function middleStart(input: PlanInput): number {
  const starts = buildOptions(input).map(
    (options) =>
      new Set(options.filter(({ band }) => band === '432').map(({ startMs }) => startMs)),
  );
  const common = [...starts[0]!].filter((startMs) => starts.every((set) => set.has(startMs)));
  const start = common[common.length >> 1];
  if (start === undefined || common.length < (6 * HOUR_MS) / (15 * MINUTE_MS)) {
    throw new Error('The three stations were to have long hours in common.');
  }
  return start;
}
