import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { computeLink, type LinkResult } from '~/domain/link/budget';
import type { LinkStation } from '~/domain/link/setup';
import {
  NORTH,
  SETUP,
  SOUTH,
  UP_MS,
  WEST,
  anyFrequencyMhz,
  anySetup,
  anyStation,
  anyTimeMs,
  withSetup,
} from './stations';

const RUNS = { numRuns: 150 };
const ROUNDING = 1e-9;

function link(
  first: LinkStation,
  second: LinkStation,
  frequencyMhz: number,
  timeMs: number,
  more: { solarFlux10cmSfu?: number; mode?: string } = {},
): LinkResult {
  return computeLink({
    stations: [first, second],
    frequencyMhz,
    mode: more.mode ?? 'q65-60c',
    timeMs,
    solarFlux10cmSfu: more.solarFlux10cmSfu,
  });
}

describe('exchanging the two stations', () => {
  it('leaves path loss, Doppler, spread and delay, and exchanges the directions', () => {
    fc.assert(
      fc.property(anyStation, anyStation, anyFrequencyMhz, anyTimeMs, (a, b, mhz, timeMs) => {
        const there = link(a, b, mhz, timeMs);
        const back = link(b, a, mhz, timeMs);
        expect(back.pathLossDb).toBeCloseTo(there.pathLossDb, 9);
        expect(back.dopplerHz).toBeCloseTo(there.dopplerHz, 6);
        expect(back.spreadHz).toBeCloseTo(there.spreadHz, 6);
        expect(back.echoDelayS).toBeCloseTo(there.echoDelayS, 9);
        for (const way of [0, 1] as const) {
          const mirrored = back.directions[way === 0 ? 1 : 0];
          expect(mirrored.snrDb).toBeCloseTo(there.directions[way].snrDb, 6);
          expect(mirrored.marginDb).toBeCloseTo(there.directions[way].marginDb, 6);
        }
        expect(Math.abs(back.contactChance - there.contactChance)).toBeLessThan(1e-3);
      }),
      RUNS,
    );
  });
});

describe('more of what helps', () => {
  it('more power never lowers a margin or a chance', () => {
    fc.assert(
      fc.property(
        anyStation,
        anyStation,
        anyFrequencyMhz,
        anyTimeMs,
        fc.double({ min: 1, max: 50, noNaN: true }),
        (a, b, mhz, timeMs, times) => {
          const louder = withSetup(a, { powerAtFeedW: a.setup.powerAtFeedW * times });
          const before = link(a, b, mhz, timeMs);
          const after = link(louder, b, mhz, timeMs);
          const gained = after.directions[0].marginDb - before.directions[0].marginDb;
          expect(gained).toBeCloseTo(10 * Math.log10(times), 6);
          expect(after.directions[1].marginDb).toBeCloseTo(before.directions[1].marginDb, 9);
          expect(after.contactChance).toBeGreaterThanOrEqual(before.contactChance - ROUNDING);
          expect(after.directions[0].chance).toBeGreaterThanOrEqual(
            before.directions[0].chance - ROUNDING,
          );
        },
      ),
      RUNS,
    );
  });

  it('more receiver noise never raises a margin or a chance', () => {
    fc.assert(
      fc.property(
        anyStation,
        anyStation,
        anyFrequencyMhz,
        anyTimeMs,
        fc.double({ min: 10, max: 800, noNaN: true }),
        fc.double({ min: 0, max: 800, noNaN: true }),
        (a, b, mhz, timeMs, kelvin, added) => {
          const hearing = (receiverTemperatureK: number) =>
            link(
              a,
              withSetup(b, { receive: { kind: 'receiver', receiverTemperatureK } }),
              mhz,
              timeMs,
            );
          const [before, after] = [hearing(kelvin), hearing(kelvin + added)];
          expect(after.directions[0].marginDb).toBeLessThanOrEqual(
            before.directions[0].marginDb + ROUNDING,
          );
          expect(after.contactChance).toBeLessThanOrEqual(before.contactChance + ROUNDING);
        },
      ),
      RUNS,
    );
  });

  it('a more active Sun, a worse pointing and a warmer surrounding never raise a margin', () => {
    fc.assert(
      fc.property(anyStation, anyStation, anyFrequencyMhz, anyTimeMs, (a, b, mhz, timeMs) => {
        const quiet = link(a, b, mhz, timeMs, { solarFlux10cmSfu: 65 });
        const active = link(a, b, mhz, timeMs, { solarFlux10cmSfu: 250 });
        const astray = link(
          withSetup(a, { pointingErrorDeg: (a.setup.pointingErrorDeg ?? 0) + 0.3 }),
          b,
          mhz,
          timeMs,
          { solarFlux10cmSfu: 65 },
        );
        for (const way of [0, 1] as const) {
          const margin = quiet.directions[way].marginDb + ROUNDING;
          expect(active.directions[way].marginDb).toBeLessThanOrEqual(margin);
        }
        expect(astray.directions[0].marginDb).toBeLessThanOrEqual(
          quiet.directions[0].marginDb + ROUNDING,
        );
      }),
      RUNS,
    );
  });
});

describe('every answer', () => {
  it('is finite, adds up in its ledger and keeps its ranges', () => {
    fc.assert(
      fc.property(anyStation, anyStation, anyFrequencyMhz, anyTimeMs, (a, b, mhz, timeMs) => {
        const found = link(a, b, mhz, timeMs);
        expect(found.polarizationOffsetDeg).toBeGreaterThanOrEqual(0);
        expect(found.polarizationOffsetDeg).toBeLessThan(180);
        expect(found.contactChance).toBeGreaterThanOrEqual(0);
        expect(found.contactChance).toBeLessThanOrEqual(1);
        for (const direction of found.directions) {
          const { ledger, ...figures } = direction;
          for (const value of Object.values(figures)) {
            if (typeof value === 'number') expect(Number.isFinite(value)).toBe(true);
          }
          expect(ledger.signal.at(-1)!.level).toBeCloseTo(direction.marginDb, 6);
          expect(ledger.noise.at(-1)!.level).toBeCloseTo(direction.systemTemperatureK, 6);
          const received = ledger.signal.find((term) => term.key === 'receiveGain')!.level;
          expect(received).toBeCloseTo(direction.receivedPowerDbw, 6);
          expect(direction.chance).toBeGreaterThanOrEqual(0);
          expect(direction.chance).toBeLessThanOrEqual(1);
          if (!found.moonUp) expect(direction.chance).toBe(0);
        }
      }),
      RUNS,
    );
  });

  it('gives no chance with the Moon below a horizon, and says so', () => {
    const found = link(NORTH, WEST, 1296, UP_MS + 12 * 3_600_000);
    expect(found.moonUp).toBe(false);
    expect(found.contactChance).toBe(0);
    expect(found.notes.join(' ')).toMatch(/below the horizon/);
  });
});

/**
 * Steps of a minute through twelve hours: nothing may jump at midnight, through north or where 360° becomes 0°.
 * Near the horizon the air changes the noise quickly, but not abruptly.
 */
describe('continuity', () => {
  const STEP_MS = 10_000;
  const NEAR_HORIZON_DB = 0.8;
  const CLEAR_DB = 0.08;
  const pairs: [string, LinkStation, LinkStation][] = [
    [
      'two southern stations (the Moon passes north)',
      SOUTH,
      { ...SOUTH, site: { latitudeDeg: -30, longitudeDeg: 25, heightM: 0 } },
    ],
    [
      'either side of the date line',
      { ...WEST, site: { latitudeDeg: 10, longitudeDeg: 179.9, heightM: 0 } },
      { ...WEST, site: { latitudeDeg: 12, longitudeDeg: -179.9, heightM: 0 } },
    ],
    ['north and west', NORTH, WEST],
  ];

  it.each(pairs)('%s', (_name, first, second) => {
    const startMs = Date.UTC(2026, 11, 31, 18);
    let before = link(first, second, 1296, startMs);
    for (let timeMs = startMs + 60_000; timeMs < startMs + 12 * 3_600_000; timeMs += 60_000) {
      const now = link(first, second, 1296, timeMs);
      expect(Math.abs(now.pathLossDb - before.pathLossDb)).toBeLessThan(0.002);
      expect(Math.abs(now.dopplerHz - before.dopplerHz)).toBeLessThan(20);
      expect(Math.abs(now.spreadHz - before.spreadHz)).toBeLessThan(0.2);
      const turn = Math.abs(now.polarizationOffsetDeg - before.polarizationOffsetDeg);
      expect(Math.min(turn, 180 - turn)).toBeLessThan(2);
      const low = Math.min(...now.elevationDeg) < 5;
      const step = Math.abs(now.directions[0].marginDb - before.directions[0].marginDb);
      expect(step).toBeLessThan(low ? NEAR_HORIZON_DB : CLEAR_DB);
      before = now;
    }
  });

  it('across midnight in steps of ten seconds', () => {
    const midnight = Date.UTC(2027, 0, 1);
    let before = link(NORTH, WEST, 1296, midnight - 5 * STEP_MS);
    for (let timeMs = midnight - 4 * STEP_MS; timeMs < midnight + 5 * STEP_MS; timeMs += STEP_MS) {
      const now = link(NORTH, WEST, 1296, timeMs);
      expect(Math.abs(now.dopplerHz - before.dopplerHz)).toBeLessThan(3);
      expect(Math.abs(now.directions[0].marginDb - before.directions[0].marginDb)).toBeLessThan(
        0.02,
      );
      before = now;
    }
  });

  it('is the same at longitude 180° and −180°', () => {
    const at = (longitudeDeg: number) => ({
      ...WEST,
      site: { latitudeDeg: 40, longitudeDeg, heightM: 0 },
    });
    const [east, west] = [link(NORTH, at(180), 432, UP_MS), link(NORTH, at(-180), 432, UP_MS)];
    expect(east.directions[0].snrDb).toBeCloseTo(west.directions[0].snrDb, 9);
    expect(east.dopplerHz).toBeCloseTo(west.dopplerHz, 6);
  });
});

describe('a measured system temperature', () => {
  it('gets only Moon, Sun and warmer sky added', () => {
    fc.assert(
      fc.property(anySetup, anyFrequencyMhz, anyTimeMs, (setup, mhz, timeMs) => {
        const measured = {
          ...NORTH,
          setup: { ...setup, receive: { kind: 'measured', systemTemperatureK: 90 } as const },
        };
        const [, toFirst] = link(measured, WEST, mhz, timeMs).directions;
        const addedK = toFirst.systemTemperatureK - 90;
        const warmerK = addedK - toFirst.moonTemperatureK - toFirst.sunTemperatureK;
        expect(warmerK).toBeGreaterThanOrEqual(-ROUNDING);
        expect(warmerK).toBeLessThan(toFirst.skyTemperatureK);
      }),
      RUNS,
    );
  });

  it('is never colder than measured on the coldest sky', () => {
    const measured = withSetup(NORTH, { receive: { kind: 'measured', systemTemperatureK: 60 } });
    const [, toFirst] = link(measured, WEST, 1296, UP_MS).directions;
    const keys = toFirst.ledger.noise.map((term) => term.key);
    expect(keys).toEqual(['measuredSystem', 'warmerSky', 'moon', 'sun']);
    expect(toFirst.ledger.noise[0]!.level).toBe(60);
  });
});

describe('polarisation in the budget', () => {
  const lossOf = (first: LinkStation['setup']['polarization'], second: typeof first, mhz: number) =>
    link(
      withSetup(NORTH, { polarization: first }),
      withSetup(WEST, { polarization: second }),
      mhz,
      UP_MS,
    ).directions[0].polarizationLossDb;

  /** The offset of this pair at this instant is 101.23°. */
  it.each([
    [
      'horizontal',
      'horizontal',
      1296,
      -20 * Math.log10(Math.abs(Math.cos((101.23 * Math.PI) / 180))),
    ],
    ['horizontal', 'vertical', 1296, -20 * Math.log10(Math.abs(Math.cos((11.23 * Math.PI) / 180)))],
    ['vertical', 'rotatable', 1296, 0],
    ['rotatable', 'vertical', 1296, 0],
    ['rotatable', 'vertical', 432, 3.0103],
    ['vertical', 'rotatable', 432, 0],
    ['horizontal', 'horizontal', 144, 3.0103],
    ['rightCircular', 'rightCircular', 1296, 0],
    ['rightCircular', 'leftCircular', 1296, 22],
    ['rightCircular', 'vertical', 10_368, 3.0103],
    ['rotatable', 'leftCircular', 10_368, 3.0103],
  ] as const)('%s to %s at %s MHz', (first, second, mhz, loss) => {
    expect(Math.abs(lossOf(first, second, mhz) - loss)).toBeLessThan(0.01);
  });
});

describe('spread in the budget', () => {
  it('costs nothing within the tone spacing and 5 log of the ratio beyond', () => {
    const narrow = link(NORTH, WEST, 10_368, UP_MS, { mode: 'q65-60b' });
    const wide = link(NORTH, WEST, 10_368, UP_MS, { mode: 'q65-60e' });
    const ratio = narrow.halfPowerSpreadHz / (10 / 3);
    expect(narrow.directions[0].spreadLossDb).toBeCloseTo(5 * Math.log10(ratio), 6);
    expect(wide.directions[0].spreadLossDb).toBeLessThan(narrow.directions[0].spreadLossDb);
    expect(link(NORTH, WEST, 144, UP_MS, { mode: 'q65-60b' }).directions[0].spreadLossDb).toBe(0);
  });

  it('is left as it is by the equipment', () => {
    const small = withSetup(NORTH, { antenna: { kind: 'gain', gainDbi: 20 } });
    expect(link(small, WEST, 1296, UP_MS).spreadHz).toBe(
      link({ ...NORTH, setup: SETUP }, WEST, 1296, UP_MS).spreadHz,
    );
  });
});
