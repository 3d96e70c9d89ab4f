import {
  azimuthWidthDeg,
  prepareProfile,
  profileElevationDeg,
  type SkyLimits,
} from '../../domain/sky';

/** A point of the drawing: the zenith is 0, 0; x to the east, y downwards (south). */
export interface DomePoint {
  x: number;
  y: number;
}

const DEGREE = Math.PI / 180;

/** Distance from the zenith at equal steps of elevation; what is under the horizon is put on the rim. */
export function domeRadius(elevationDeg: number, radius: number): number {
  return (radius * (90 - Math.min(90, Math.max(0, elevationDeg)))) / 90;
}

/** North up, east right, zenith in the middle. */
export function domePoint(azimuthDeg: number, elevationDeg: number, radius: number): DomePoint {
  const distance = domeRadius(elevationDeg, radius);
  return {
    x: distance * Math.sin(azimuthDeg * DEGREE),
    y: -distance * Math.cos(azimuthDeg * DEGREE),
  };
}

/** Azimuth 0 … below 360 and elevation of a point; outside the rim the elevation is negative. */
export function domeDirection(
  { x, y }: DomePoint,
  radius: number,
): { azimuthDeg: number; elevationDeg: number } {
  return {
    azimuthDeg: (Math.atan2(x, -y) / DEGREE + 360) % 360,
    elevationDeg: 90 - (90 * Math.hypot(x, y)) / radius,
  };
}

const show = (value: number) => (Math.round(value * 100) / 100 || 0).toString();

/** "x y" of a direction, for paths. */
export function domeXy(azimuthDeg: number, elevationDeg: number, radius: number): string {
  const { x, y } = domePoint(azimuthDeg, elevationDeg, radius);
  return `${show(x)} ${show(y)}`;
}

/** A line through directions; for tracks cut it where the Moon is under the horizon. */
export function domeLine(
  points: readonly { azimuthDeg: number; elevationDeg: number }[],
  radius: number,
): string {
  if (points.length === 0) return '';
  return `M${points
    .map((point) => domeXy(point.azimuthDeg, point.elevationDeg, radius))
    .join('L')}`;
}

interface Patch {
  azimuthFromDeg: number;
  azimuthToDeg: number;
  elevationFromDeg: number;
  elevationToDeg: number;
}

/** Outline of a part of the sky between two azimuths (clockwise) and two elevations; fill it evenodd. */
export function patchPath(patch: Patch, radius: number): string {
  const outer = domeRadius(patch.elevationFromDeg, radius);
  const inner = domeRadius(patch.elevationToDeg, radius);
  const widthDeg = azimuthWidthDeg(patch.azimuthFromDeg, patch.azimuthToDeg);
  if (widthDeg >= 360) return `${circlePath(outer)}${circlePath(inner)}`;
  const large = widthDeg > 180 ? 1 : 0;
  const corner = (azimuthDeg: number, elevationDeg: number) =>
    domeXy(azimuthDeg, elevationDeg, radius);
  const { azimuthFromDeg: from, azimuthToDeg: to, elevationFromDeg, elevationToDeg } = patch;
  return [
    `M${corner(from, elevationFromDeg)}`,
    `A${show(outer)} ${show(outer)} 0 ${large} 1 ${corner(to, elevationFromDeg)}`,
    `L${corner(to, elevationToDeg)}`,
    inner > 0 ? `A${show(inner)} ${show(inner)} 0 ${large} 0 ${corner(from, elevationToDeg)}` : '',
    'Z',
  ].join('');
}

function circlePath(r: number): string {
  if (r <= 0) return '';
  return `M${show(-r)} 0A${show(r)} ${show(r)} 0 1 1 ${show(r)} 0A${show(r)} ${show(r)} 0 1 1 ${show(-r)} 0Z`;
}

/** The horizon profile as the area between the rim and the profile; '' without one. Fill it evenodd. */
export function horizonPath(sky: SkyLimits, radius: number): string {
  const profile = prepareProfile(sky.horizon);
  if (!profile || profile.highestDeg <= 0) return '';
  const azimuths = new Set<number>(profile.azimuthsDeg);
  for (let azimuthDeg = 0; azimuthDeg < 360; azimuthDeg += 2) azimuths.add(azimuthDeg);
  const edge = [...azimuths]
    .sort((a, b) => a - b)
    .map((azimuthDeg) => domeXy(azimuthDeg, profileElevationDeg(profile, azimuthDeg), radius))
    .join('L');
  return `${circlePath(radius)}M${edge}Z`;
}

/** Parts of the sky outside the azimuth range and over the highest elevation. */
export function unreachablePaths(sky: SkyLimits, radius: number): string[] {
  const paths: string[] = [];
  const { azimuthFromDeg, azimuthToDeg, elevationToDeg } = sky;
  if (
    azimuthFromDeg !== undefined &&
    azimuthToDeg !== undefined &&
    azimuthWidthDeg(azimuthFromDeg, azimuthToDeg) < 360
  ) {
    paths.push(
      patchPath(
        {
          azimuthFromDeg: azimuthToDeg,
          azimuthToDeg: azimuthFromDeg,
          elevationFromDeg: 0,
          elevationToDeg: 90,
        },
        radius,
      ),
    );
  }
  if (elevationToDeg !== undefined && elevationToDeg < 90) {
    paths.push(circlePath(domeRadius(elevationToDeg, radius)));
  }
  return paths;
}

/** Runs of a track above the horizon, each to be drawn as one line. */
export function runsAboveHorizon<T extends { elevationDeg: number }>(track: readonly T[]): T[][] {
  const runs: T[][] = [];
  let run: T[] = [];
  for (const point of track) {
    if (point.elevationDeg >= 0) {
      run.push(point);
    } else if (run.length > 0) {
      runs.push(run);
      run = [];
    }
  }
  if (run.length > 0) runs.push(run);
  return runs;
}
