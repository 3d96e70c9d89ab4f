import { wrap360 } from '../ephemeris/constants';
import type { HorizonPoint } from './limits';

/** A horizon profile made ready: points sorted by azimuth, closed through north. */
export interface HorizonProfile {
  readonly azimuthsDeg: Float64Array;
  readonly elevationsDeg: Float64Array;
  readonly lowestDeg: number;
  readonly highestDeg: number;
}

/** Null where there are no points. One point alone means the same elevation all around. */
export function prepareProfile(points: readonly HorizonPoint[] | undefined): HorizonProfile | null {
  if (!points || points.length === 0) return null;
  const sorted = points
    .map((point) => ({ az: wrap360(point.azimuthDeg), el: point.elevationDeg }))
    .sort((a, b) => a.az - b.az);
  const elevationsDeg = Float64Array.from(sorted, (point) => point.el);
  return {
    azimuthsDeg: Float64Array.from(sorted, (point) => point.az),
    elevationsDeg,
    lowestDeg: Math.min(...elevationsDeg),
    highestDeg: Math.max(...elevationsDeg),
  };
}

/** Index of the last point at or before the azimuth (0 … below 360); −1 before the first. */
export function lastPointBefore(profile: HorizonProfile, azimuthDeg: number): number {
  const { azimuthsDeg } = profile;
  let low = 0;
  let high = azimuthsDeg.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (azimuthsDeg[middle]! <= azimuthDeg) low = middle + 1;
    else high = middle;
  }
  return low - 1;
}

/** Elevation of the profile at an azimuth of 0 … 360. */
export function profileElevationDeg(profile: HorizonProfile, azimuthDeg: number): number {
  const { azimuthsDeg, elevationsDeg } = profile;
  const count = azimuthsDeg.length;
  const before = lastPointBefore(profile, azimuthDeg);
  const left = before < 0 ? count - 1 : before;
  const right = before + 1 === count ? 0 : before + 1;
  const fromDeg = azimuthsDeg[left]! - (before < 0 ? 360 : 0);
  const toDeg = azimuthsDeg[right]! + (before + 1 === count ? 360 : 0);
  const fromEl = elevationsDeg[left]!;
  if (toDeg <= fromDeg) return fromEl;
  return fromEl + ((elevationsDeg[right]! - fromEl) * (azimuthDeg - fromDeg)) / (toDeg - fromDeg);
}
