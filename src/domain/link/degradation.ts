import { astroTime, moonOfDate } from '../ephemeris/engine';
import { eclipticJ2000 } from './ecliptic';
import { skyBeam, skyTemperatureK, type SkyBeam } from './skyNoise';

/** Least distance between the centres: 348 030 km surface to surface (published constant, from memory). */
export const LEAST_DISTANCE_KM = 356_146;

/** The Moon's path stays within this ecliptic latitude. */
const PATH_LATITUDE_DEG = 5.25;

/** The reference receiver of a frequency: what degradation is counted against. */
export interface ReferenceReceiver {
  receiverTemperatureK: number;
  beamwidthDeg: number;
}

/**
 * 80 K at 144 MHz and 60 K at 432 MHz with a beam of 15° are the constants of the published definition (from
 * memory). The other bands are this project's own choice of what good stations there have: an array of about 15°
 * up to 432 MHz, dishes of 2 to 4 m above, where cold sky is nearly even and distance decides.
 */
const REFERENCES: readonly (readonly [upToMhz: number, receiverK: number, beamDeg: number])[] = [
  [100, 150, 25],
  [200, 80, 15],
  [300, 70, 15],
  [600, 60, 15],
  [1100, 50, 8],
  [2000, 45, 5],
  [3000, 50, 3],
  [4500, 55, 2],
  [8000, 60, 1.3],
  [15_000, 80, 0.7],
  [35_000, 150, 0.4],
  [Infinity, 300, 0.25],
];

export function referenceReceiver(frequencyMhz: number): ReferenceReceiver {
  const [, receiverTemperatureK, beamwidthDeg] = REFERENCES.find(
    ([upToMhz]) => frequencyMhz <= upToMhz,
  )!;
  return { receiverTemperatureK, beamwidthDeg };
}

/** Everything about one frequency that degradation needs; made once per search. */
export interface DegradationModel {
  readonly beam: SkyBeam;
  readonly receiverTemperatureK: number;
  /** Coldest sky on the Moon's path through this beam. */
  readonly coldestK: number;
}

const KEPT_MODELS = 64;
const models = new Map<number, DegradationModel>();

/** Models are kept by frequency, because finding the coldest sky of the path takes a millisecond. */
export function degradationModel(frequencyMhz: number): DegradationModel {
  let model = models.get(frequencyMhz);
  if (!model) {
    model = makeModel(frequencyMhz);
    if (models.size >= KEPT_MODELS) models.clear();
    models.set(frequencyMhz, model);
  }
  return model;
}

function makeModel(frequencyMhz: number): DegradationModel {
  const { receiverTemperatureK, beamwidthDeg } = referenceReceiver(frequencyMhz);
  const beam = skyBeam(frequencyMhz, beamwidthDeg);
  let coldestK = Infinity;
  for (let longitude = 0; longitude < 360; longitude += 2) {
    for (let latitude = -PATH_LATITUDE_DEG; latitude <= PATH_LATITUDE_DEG; latitude += 1.05) {
      coldestK = Math.min(coldestK, skyTemperatureK(beam, longitude, latitude));
    }
  }
  return { beam, receiverTemperatureK, coldestK };
}

/**
 * Loss against the Moon at its least distance in front of the coldest sky of its path, dB, never far below 0:
 * 40 log(d/d_min) + 10 log[(T_sky + T_rx)/(T_sky,min + T_rx)] (published definition, read in the source:
 * CQ VHF 2006/2007). Distance is geocentric, so that the figure is the same for every station.
 */
export function degradationDb(
  model: DegradationModel,
  geocentricDistanceKm: number,
  skyK: number,
): number {
  const distance = 40 * Math.log10(geocentricDistanceKm / LEAST_DISTANCE_KM);
  const receiver = model.receiverTemperatureK;
  return distance + 10 * Math.log10((skyK + receiver) / (model.coldestK + receiver));
}

/** Sky temperature behind the Moon, K, and degradation, dB, at an instant; `ofDate` saves computing the Moon. */
export function skyAndDegradation(
  model: DegradationModel,
  timeMs: number,
  ofDate: ArrayLike<number> = moonOfDate(astroTime(timeMs)),
): { skyTemperatureK: number; degradationDb: number } {
  const { longitudeDeg, latitudeDeg } = eclipticJ2000(ofDate, timeMs);
  const skyK = skyTemperatureK(model.beam, longitudeDeg, latitudeDeg);
  const distanceKm = Math.hypot(ofDate[0]!, ofDate[1]!, ofDate[2]!);
  return { skyTemperatureK: skyK, degradationDb: degradationDb(model, distanceKm, skyK) };
}
