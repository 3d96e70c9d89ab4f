import { directMoon, moonSamples, tableFor, type MoonSample } from '../../domain/ephemeris';
import {
  degradationModel,
  dopplerHz,
  libration,
  pathLossDb,
  skyAndDegradation,
  spreadHz,
  type DegradationModel,
} from '../../domain/link';
import type { MoonTable } from '../../domain/ephemeris';
import type { Site } from '../../domain/sky';
import type { MoonAnswer } from './calculatorAnswers';
import type { MoonRequest } from './calculatorSchemas';
import { angle, bearing, instantText, rounded } from './figures';

/** Moon and Sun for one site at each instant, in the order asked; with a frequency its radio figures too. */
export function computeMoonSamples({ site, times, frequencyMhz }: MoonRequest): MoonAnswer {
  const table = tableFor(times);
  const radio = frequencyMhz === undefined ? null : new RadioFigures(site, frequencyMhz, table);
  const samples = moonSamples(site, times, table).map((sample) => ({
    time: instantText(sample.timeMs),
    azimuthDeg: bearing(sample.azimuthDeg),
    elevationDeg: angle(sample.elevationDeg),
    refractedElevationDeg: angle(sample.refractedElevationDeg),
    rangeKm: rounded(sample.rangeKm, 4),
    rangeRateMps: rounded(sample.rangeRateMps, 5),
    geocentricDistanceKm: rounded(sample.geocentricDistanceKm, 4),
    rightAscensionDeg: bearing(sample.rightAscensionDeg),
    declinationDeg: angle(sample.declinationDeg),
    sunAzimuthDeg: bearing(sample.sunAzimuthDeg),
    sunElevationDeg: angle(sample.sunElevationDeg),
    sunSeparationDeg: angle(sample.sunSeparationDeg),
    ...radio?.at(sample),
  }));
  return { samples };
}

class RadioFigures {
  readonly #model: DegradationModel;

  constructor(
    readonly site: Site,
    readonly frequencyMhz: number,
    readonly table: MoonTable | null,
  ) {
    this.#model = degradationModel(frequencyMhz);
  }

  at(sample: MoonSample) {
    const { site, frequencyMhz, table } = this;
    const { timeMs, rangeKm, rangeRateMps } = sample;
    const seen = libration(site, timeMs, table ?? directMoon);
    const { skyTemperatureK, degradationDb } = skyAndDegradation(this.#model, timeMs);
    return {
      pathLossDb: rounded(pathLossDb(frequencyMhz, rangeKm), 4),
      ownEchoDopplerHz: rounded(dopplerHz(frequencyMhz, rangeRateMps), 3),
      ownEchoSpreadHz: rounded(spreadHz(frequencyMhz, seen), 4),
      skyTemperatureK: rounded(skyTemperatureK, 3),
      degradationDb: rounded(degradationDb, 4),
    };
  }
}
