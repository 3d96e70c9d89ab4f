import { formatNumber } from '../time/format';
import type { ExposureLevel } from './exposureEstimate';

/** Power density with the ground's reflection, as OET-65 counts it: 1.6 times the field. */
export const GROUND_FACTOR = 2.56;
/** Below this, antennas are low and wide enough to count the ground from the start. */
export const GROUND_BELOW_MHZ = 1000;

export const LEVEL_WORDS: Record<ExposureLevel['id'], string> = {
  fccOccupational: 'People who know and control it, FCC',
  fccGeneral: 'Everybody, FCC',
  icnirpGeneral: 'Everybody, ICNIRP 2020',
};

/** How far out in the beam a level is exceeded. */
export function distanceWords({ distanceM, cautiousM }: ExposureLevel): string {
  if (cautiousM !== null) return `${metresWords(cautiousM)}, by the higher peak`;
  return distanceM === 0 ? 'nowhere' : metresWords(distanceM);
}

/** Rounded up: the safe way. */
export function metresWords(distanceM: number): string {
  return distanceM < 10
    ? `${formatNumber(Math.ceil(distanceM * 10) / 10, 1)} m`
    : `${formatNumber(Math.ceil(distanceM))} m`;
}
