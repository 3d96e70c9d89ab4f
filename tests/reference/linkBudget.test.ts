import { describe, expect, it } from 'vitest';
import { dishGainDbi } from '../../src/domain/link/antenna';
import { computeLink } from '../../src/domain/link/budget';
import { toDb } from '../../src/domain/link/decibel';
import { pathLossDb } from '../../src/domain/link/pathLoss';
import type { LinkStation } from '../../src/domain/link/setup';

const dish = (site: LinkStation['site']): LinkStation => ({
  site,
  setup: {
    antenna: { kind: 'dish', diameterM: 3, apertureEfficiency: 0.55 },
    polarization: 'rightCircular',
    powerAtFeedW: 200,
    receive: { kind: 'receiver', receiverTemperatureK: 40, spilloverK: 15 },
  },
});
const FIRST = dish({ latitudeDeg: 50, longitudeDeg: 10, heightM: 0 });
const SECOND = dish({ latitudeDeg: 40, longitudeDeg: -75, heightM: 0 });

/**
 * Worked budget, computed for the project in another language: two 3 m dishes at 1296 MHz, 200 W, 63.0 K, Moon at
 * 384 400 km: −188.96 dBW, −12.3 dB in 2500 Hz. Not used to build.
 */
describe('worked budget', () => {
  const WORKED_DB = 0.1;
  const receivedDbw = toDb(200) + 2 * dishGainDbi(3, 0.55, 1296) - pathLossDb(1296, 384_400);
  const noiseDbw = toDb(1.380649e-23 * 63.0 * 2500);

  it('by its parts', () => {
    expect(Math.abs(receivedDbw - -188.96)).toBeLessThan(0.02);
    expect(Math.abs(receivedDbw - noiseDbw - -12.3)).toBeLessThan(WORKED_DB);
  });

  it('and whole, corrected for its own distance, air and noise', () => {
    const link = computeLink({
      stations: [FIRST, SECOND],
      frequencyMhz: 1296,
      mode: 'cw',
      timeMs: Date.UTC(2026, 2, 25, 20),
    });
    const [there] = link.directions;
    const distance = link.pathLossDb - pathLossDb(1296, 384_400);
    const noise = toDb(there.systemTemperatureK / 63.0);
    const found = there.snrDb + distance + noise + there.atmosphereLossDb;
    expect(Math.abs(found - -12.3)).toBeLessThan(WORKED_DB);
  });
});

/** Computed for the project in another language from DE405; not used to build. */
describe('three dated cases at 1296 MHz', () => {
  it.each([
    ['2026-03-25T20:00:00Z', 76.9, 13.27, 101.23],
    ['2026-09-03T06:00:00Z', 777.5, 13.38, 91.11],
    ['2027-02-15T18:00:00Z', 1881.9, 5.26, 39.29],
  ])('%s: Doppler %s Hz, spread %s Hz, offset %s°', (utc, doppler, spread, offset) => {
    const link = computeLink({
      stations: [FIRST, SECOND],
      frequencyMhz: 1296,
      mode: 'q65-60c',
      timeMs: Date.parse(utc),
    });
    expect(Math.abs(link.dopplerHz - doppler)).toBeLessThan(0.4);
    expect(Math.abs(link.spreadHz - spread)).toBeLessThan(0.05);
    expect(Math.abs(link.polarizationOffsetDeg - offset)).toBeLessThan(0.02);
  });
});
