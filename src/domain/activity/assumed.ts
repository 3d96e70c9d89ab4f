import { bandById, type BandId } from '../station/bands';
import type { BandSetup } from '../station/setup';

/**
 * Equipment that is taken for a station which comes on a band but has described none: a small station as one meets them
 * on that band, so that the plan errs to the careful side. Own estimate, no source.
 */
export function assumedSetup(band: BandId): BandSetup {
  const { centreMhz } = bandById(band);
  const chain = { kind: 'measured' as const, systemTemperatureK: centreMhz < 1000 ? 200 : 110 };
  if (centreMhz < 1000) {
    return {
      antenna: { kind: 'gain', gainDbi: centreMhz < 100 ? 13 : centreMhz < 200 ? 17 : 20 },
      polarization: 'horizontal',
      powerAtFeedW: 500,
      receive: chain,
    };
  }
  return {
    antenna: { kind: 'dish', diameterM: centreMhz < 3000 ? 2.4 : 1.8, apertureEfficiency: 0.5 },
    polarization: centreMhz < 9000 ? 'rightCircular' : 'horizontal',
    powerAtFeedW: centreMhz < 3000 ? 150 : centreMhz < 9000 ? 50 : 20,
    receive: chain,
  };
}
