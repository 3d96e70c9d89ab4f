import { azimuthSpan, compileSector, limitSine, spanHolds } from './compile';
import type { AzimuthSpan, Sector } from './compile';
import { elevationBoundary, type Boundary } from './boundary';
import type { SkyLimits } from './limits';

/** The limits of a station without a horizon profile, for those who only ask whether any of them forbids. */
export interface FreeSky {
  /** Below this elevation nothing is free: the highest of all lower limits. */
  readonly floor: Boundary;
  readonly highSin: number;
  /** Where a direction above the floor can become free or forbidden. */
  readonly boundaries: readonly Boundary[];
  readonly azimuth: AzimuthSpan | null;
  readonly sectors: readonly Sector[];
}

const NONE: readonly never[] = [];

/** The same sky as `compileSky` makes of these limits, less what tells its reasons; null where there is a profile. */
export function freeSky(limits: SkyLimits, refraction = false): FreeSky | null {
  if (limits.horizon?.length) return null;
  const { azimuthFromDeg, azimuthToDeg, elevationToDeg: to, blocked } = limits;
  const seenDeg = limits.elevationFromDeg ?? 0;
  const floorDeg = Math.max(seenDeg, limits.transmitElevationFromDeg ?? seenDeg);
  const floorSin = limitSine(floorDeg, refraction);
  const floor = elevationBoundary(floorSin);
  const highSin = to === undefined ? 2 : limitSine(to, refraction);
  const azimuth =
    azimuthFromDeg === undefined || azimuthToDeg === undefined
      ? null
      : azimuthSpan(azimuthFromDeg, azimuthToDeg);
  if (!azimuth && highSin >= 1 && !blocked?.length) {
    return { floor, highSin, boundaries: NONE, azimuth, sectors: NONE };
  }
  const boundaries: Boundary[] = [];
  if (highSin < 1) boundaries.push(elevationBoundary(highSin));
  if (azimuth) addSpan(boundaries, azimuth);
  const sectors: Sector[] = [];
  for (const one of blocked ?? NONE) {
    const sector = compileSector(one, refraction);
    sectors.push(sector);
    addSpan(boundaries, sector.span);
    if (sector.lowSin > floorSin) boundaries.push(elevationBoundary(sector.lowSin));
    if (sector.highSin > floorSin && sector.highSin < 1) {
      boundaries.push(elevationBoundary(sector.highSin));
    }
  }
  return { floor, highSin, boundaries, azimuth, sectors };
}

function addSpan(boundaries: Boundary[], { from, to, widthDeg }: AzimuthSpan): void {
  if (widthDeg < 360) boundaries.push(from, to);
}

/** Whether nothing forbids a unit direction that stands above the floor. */
export function freeAboveFloor(sky: FreeSky, east: number, north: number, up: number): boolean {
  if (up > sky.highSin) return false;
  if (sky.azimuth && !spanHolds(sky.azimuth, east, north)) return false;
  for (let index = 0; index < sky.sectors.length; index += 1) {
    const { span, lowSin, highSin } = sky.sectors[index]!;
    if (up >= lowSin && up <= highSin && spanHolds(span, east, north)) return false;
  }
  return true;
}
