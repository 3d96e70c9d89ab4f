/** What the dish of one station can see. */
export { azimuthWidthDeg, azimuthWithin } from './azimuth';
export { compiledSkyCause, skyCause, skyFree } from './cause';
export {
  SKY_REASONS,
  compileSky,
  type CompiledSky,
  type SkyCause,
  type SkyReason,
} from './compile';
export type { BlockedSector, HorizonPoint, Site, SkyLimits } from './limits';
export { prepareProfile, profileElevationDeg, type HorizonProfile } from './profile';
