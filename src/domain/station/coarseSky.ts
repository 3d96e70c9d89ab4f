import { azimuthWidthDeg, prepareProfile, profileElevationDeg } from '../sky';
import type { SkyLimits } from '../sky/limits';

const STEP_DEG = 10;

/**
 * The sky for people outside the crew: blocked sectors widened to whole 5° and without names, the
 * horizon as its highest point in each 10° of azimuth in whole degrees. Says what can be reached
 * without drawing the neighbourhood.
 */
export function coarseSky(sky: SkyLimits): SkyLimits {
  const profile = prepareProfile(sky.horizon);
  return {
    ...sky,
    blocked: sky.blocked?.map((sector) => ({
      ...widened(sector.azimuthFromDeg, sector.azimuthToDeg),
      elevationFromDeg: Math.floor(sector.elevationFromDeg / 5) * 5,
      elevationToDeg: Math.ceil(sector.elevationToDeg / 5) * 5,
    })),
    horizon: profile
      ? Array.from({ length: 360 / STEP_DEG }, (_, step) => {
          const centreDeg = step * STEP_DEG;
          const around = Array.from({ length: STEP_DEG + 1 }, (_unused, index) =>
            profileElevationDeg(profile, (centreDeg + index - STEP_DEG / 2 + 360) % 360),
          );
          return { azimuthDeg: centreDeg, elevationDeg: Math.ceil(Math.max(...around)) };
        })
      : undefined,
  };
}

function widened(fromDeg: number, toDeg: number) {
  const azimuthFromDeg = Math.floor(fromDeg / 5) * 5;
  const azimuthToDeg = Math.ceil(toDeg / 5) * 5;
  const grown = azimuthWidthDeg(azimuthFromDeg, azimuthToDeg);
  return grown < azimuthWidthDeg(fromDeg, toDeg)
    ? { azimuthFromDeg: 0, azimuthToDeg: 360 }
    : { azimuthFromDeg, azimuthToDeg };
}
