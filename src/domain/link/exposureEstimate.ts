import {
  apertureField,
  exposureLimits,
  GENERAL_AVERAGING_MIN,
  OCCUPATIONAL_AVERAGING_MIN,
  powerDensityWm2,
  safeDistanceM,
  type Radiator,
} from './exposure';

export interface ExposureLevel {
  id: 'fccOccupational' | 'fccGeneral' | 'icnirpGeneral';
  limitWm2: number;
  averagedOverMin: number;
  /** In the beam, by the formulas of OET-65; 0: never reached. */
  distanceM: number;
  /**
   * Only where it is more: the end of the near field, because the higher peak given elsewhere exceeds the level
   * somewhere inside it.
   */
  cautiousM: number | null;
}

export interface ExposureEstimate {
  levels: ExposureLevel[];
  /** Of a dish, averaged by duty and ground; null for an antenna known by its gain only. */
  dish: {
    surfaceWm2: number;
    nearWm2: number;
    peakWm2: number;
    nearEndM: number;
    farStartM: number;
  } | null;
}

/** The distances in the beam for each level. Throws LinkInputError for what cannot be computed. */
export function exposureEstimate(radiator: Radiator): ExposureEstimate {
  const limits = exposureLimits(radiator.frequencyMhz);
  const share = (radiator.duty ?? 1) * (radiator.groundFactor ?? 1);
  const field = radiator.diameterM === undefined ? null : apertureField(radiator);
  const level = (
    id: ExposureLevel['id'],
    limitWm2: number,
    averagedOverMin: number,
  ): ExposureLevel => {
    const distanceM = safeDistanceM(radiator, limitWm2);
    const peak = field !== null && field.axisPeak * share > limitWm2;
    return {
      id,
      limitWm2,
      averagedOverMin,
      distanceM,
      cautiousM: peak && field.nearEndM > distanceM ? field.nearEndM : null,
    };
  };
  return {
    levels: [
      level('fccOccupational', limits.occupational, OCCUPATIONAL_AVERAGING_MIN),
      level('fccGeneral', limits.general, GENERAL_AVERAGING_MIN),
      level('icnirpGeneral', limits.icnirpGeneral, GENERAL_AVERAGING_MIN),
    ],
    dish: field && {
      surfaceWm2: field.surface * share,
      nearWm2: powerDensityWm2(radiator, field.nearEndM),
      peakWm2: field.axisPeak * share,
      nearEndM: field.nearEndM,
      farStartM: field.farStartM,
    },
  };
}
