import { describe, expect, it } from 'vitest';
import { computeLink, type LinkRequest } from '~/domain/link/budget';
import { LinkInputError } from '~/domain/link/inputError';
import { chainTemperatureK } from '~/domain/link/receiveChain';
import { NORTH, UP_MS, WEST, withSetup } from './stations';

const REQUEST: LinkRequest = {
  stations: [NORTH, WEST],
  frequencyMhz: 1296,
  mode: 'cw',
  timeMs: UP_MS,
};

function refusal(change: Partial<LinkRequest>): LinkInputError {
  try {
    computeLink({ ...REQUEST, ...change });
  } catch (error) {
    if (error instanceof LinkInputError) return error;
    throw error;
  }
  throw new Error('not refused');
}

const first = (change: Parameters<typeof withSetup>[1]) =>
  [withSetup(NORTH, change), WEST] as const;
const dish = (diameterM: number, apertureEfficiency: number) =>
  ({ antenna: { kind: 'dish', diameterM, apertureEfficiency } }) as const;

describe('what cannot be computed is refused with its place and a sentence', () => {
  it.each<[string, Partial<LinkRequest>, string]>([
    ['29.9 MHz', { frequencyMhz: 29.9 }, 'frequencyMhz'],
    ['100.1 GHz', { frequencyMhz: 100_100 }, 'frequencyMhz'],
    ['no frequency', { frequencyMhz: Number.NaN }, 'frequencyMhz'],
    ['an unknown mode', { mode: 'q65-15c' }, 'mode'],
    ['a time that is none', { timeMs: Number.NaN }, 'time'],
    ['a Sun without flux', { solarFlux10cmSfu: 0 }, 'solarFlux10cmSfu'],
    ['a slot of no length', { chance: { slotMinutes: 0 } }, 'slotMinutes'],
    ['negative power', { stations: first({ powerAtFeedW: -5 }) }, 'stations.0.setup.powerAtFeedW'],
    ['no power', { stations: first({ powerAtFeedW: 0 }) }, 'stations.0.setup.powerAtFeedW'],
    [
      'an efficiency over 1',
      { stations: first(dish(3, 1.01)) },
      'stations.0.setup.antenna.apertureEfficiency',
    ],
    ['no dish', { stations: first(dish(0, 0.5)) }, 'stations.0.setup.antenna.diameterM'],
    [
      'a beam of no width',
      { stations: first({ antenna: { kind: 'gain', gainDbi: 20, beamwidthDeg: 0 } }) },
      'stations.0.setup.antenna.beamwidthDeg',
    ],
    [
      'an empty chain',
      { stations: first({ receive: { kind: 'stages', stages: [] } }) },
      'stations.0.setup.receive.stages',
    ],
    [
      'a stage that makes no noise but takes it away',
      {
        stations: first({
          receive: {
            kind: 'stages',
            stages: [
              { kind: 'loss', lossDb: 0.1 },
              { kind: 'amplifier', gainDb: 20, noiseFigureDb: -1 },
            ],
          },
        }),
      },
      'stations.0.setup.receive.stages.1.noiseFigureDb',
    ],
    [
      'a measured system of 0 K',
      { stations: first({ receive: { kind: 'measured', systemTemperatureK: 0 } }) },
      'stations.0.setup.receive.systemTemperatureK',
    ],
    [
      'negative spillover',
      {
        stations: first({
          receive: { kind: 'receiver', receiverTemperatureK: 40, spilloverK: -1 },
        }),
      },
      'stations.0.setup.receive.spilloverK',
    ],
    [
      'a latitude beyond the pole',
      { stations: [NORTH, { ...WEST, site: { latitudeDeg: 91, longitudeDeg: 0, heightM: 0 } }] },
      'stations.1.site.latitudeDeg',
    ],
    [
      'a negative pointing error',
      { stations: first({ pointingErrorDeg: -1 }) },
      'stations.0.setup.pointingErrorDeg',
    ],
  ])('%s', (_name, change, path) => {
    const error = refusal(change);
    expect(error.path).toBe(path);
    expect(error.message).toMatch(/^[A-Z].{15,}\.$/);
  });

  it('an empty chain on its own', () => {
    expect(() => chainTemperatureK([])).toThrow(LinkInputError);
  });
});

describe('the edges are allowed', () => {
  it.each([30, 100_000])('%s MHz', (frequencyMhz) => {
    const found = computeLink({ ...REQUEST, frequencyMhz });
    expect(Number.isFinite(found.directions[0].marginDb)).toBe(true);
  });

  it('says that the air above 47 GHz is not known here', () => {
    expect(computeLink({ ...REQUEST, frequencyMhz: 76_000 }).notes.join(' ')).toMatch(/60 GHz/);
    expect(computeLink({ ...REQUEST, frequencyMhz: 47_088 }).notes).toEqual([]);
  });
});
