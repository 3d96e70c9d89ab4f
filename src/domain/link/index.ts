/** Path loss, Doppler, spread, sky noise and degradation. */
export {
  LEAST_DISTANCE_KM,
  degradationDb,
  degradationModel,
  referenceReceiver,
  skyAndDegradation,
  type DegradationModel,
  type ReferenceReceiver,
} from './degradation';
export {
  DIAL_CONVENTIONS,
  dialShifts,
  dopplerHz,
  type DialConvention,
  type DialShift,
} from './doppler';
export { eclipticJ2000, type Ecliptic } from './ecliptic';
export {
  MOON_REFLECTIVITY,
  echoDelayS,
  moonDiameterDeg,
  pathLossDb,
  wavelengthM,
} from './pathLoss';
export { skyBeam, skyTemperatureK, type SkyBeam } from './skyNoise';
export { halfPowerSpreadShare, libration, spreadHz, type Libration } from './spread';
