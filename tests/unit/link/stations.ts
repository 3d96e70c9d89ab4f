import fc from 'fast-check';
import type { LinkSetup, LinkStation } from '~/domain/link/setup';
import type { BandSetup, Polarization } from '~/domain/station/setup';

export const SETUP: LinkSetup = {
  antenna: { kind: 'dish', diameterM: 3, apertureEfficiency: 0.55 },
  polarization: 'rightCircular',
  powerAtFeedW: 200,
  receive: { kind: 'receiver', receiverTemperatureK: 40, spilloverK: 15 },
};

export const NORTH: LinkStation = {
  callSign: 'QA1LUN',
  site: { latitudeDeg: 50, longitudeDeg: 10, heightM: 100 },
  setup: SETUP,
};

export const WEST: LinkStation = {
  callSign: 'QB7TID',
  site: { latitudeDeg: 40, longitudeDeg: -75, heightM: 0 },
  setup: SETUP,
};

export const SOUTH: LinkStation = {
  callSign: 'QC2FAR',
  site: { latitudeDeg: -35, longitudeDeg: 20, heightM: 0 },
  setup: SETUP,
};

export function withSetup(station: LinkStation, change: Partial<LinkSetup>): LinkStation {
  return { ...station, setup: { ...station.setup, ...change } };
}

/** The Moon is up for NORTH and WEST, at 54° and 48°. */
export const UP_MS = Date.UTC(2026, 2, 25, 20);

const polarizations: readonly Polarization[] = [
  'horizontal',
  'vertical',
  'rightCircular',
  'leftCircular',
  'rotatable',
];

export const anyFrequencyMhz = fc.constantFrom(
  50.2,
  144.1,
  432.1,
  1296.1,
  5760.1,
  10368.1,
  24048.1,
);

export const anySite = fc.record({
  latitudeDeg: fc.double({ min: -89, max: 89, noNaN: true }),
  longitudeDeg: fc.double({ min: -180, max: 180, noNaN: true }),
  heightM: fc.double({ min: 0, max: 4000, noNaN: true }),
});

export const anySetup: fc.Arbitrary<LinkSetup> = fc.record({
  antenna: fc.oneof(
    fc.record({
      kind: fc.constant('dish' as const),
      diameterM: fc.double({ min: 0.5, max: 25, noNaN: true }),
      apertureEfficiency: fc.double({ min: 0.2, max: 0.8, noNaN: true }),
    }),
    fc.record({
      kind: fc.constant('gain' as const),
      gainDbi: fc.double({ min: 8, max: 40, noNaN: true }),
    }),
  ),
  polarization: fc.constantFrom(...polarizations),
  powerAtFeedW: fc.double({ min: 1, max: 1500, noNaN: true }),
  receive: fc.oneof(
    fc.record({
      kind: fc.constant('measured' as const),
      systemTemperatureK: fc.double({ min: 20, max: 2000, noNaN: true }),
    }),
    fc.record({
      kind: fc.constant('receiver' as const),
      receiverTemperatureK: fc.double({ min: 10, max: 800, noNaN: true }),
      spilloverK: fc.double({ min: 0, max: 60, noNaN: true }),
    }),
  ),
  pointingErrorDeg: fc.double({ min: 0, max: 2, noNaN: true }),
});

export const anyStation: fc.Arbitrary<LinkStation> = fc.record({ site: anySite, setup: anySetup });

export const anyTimeMs = fc.integer({ min: Date.UTC(2026, 0, 1), max: Date.UTC(2035, 0, 1) });

/** The stored equipment of a band must stay usable as it is: a change that breaks this does not compile. */
export const setupOfStored = (stored: BandSetup): LinkSetup => stored;
