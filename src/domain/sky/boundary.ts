import { DEG } from '../ephemeris/constants';

/**
 * A boundary in the sky as a signed linear function of the Moon's unit direction (e, n, u):
 * f = east · e + north · n + up · u − level. Zero on the boundary. Elevation limits are planes of constant u;
 * azimuth limits are vertical planes, of which only the half with `halfEast · e + halfNorth · n` > 0 is meant.
 */
export interface Boundary {
  readonly east: number;
  readonly north: number;
  readonly up: number;
  readonly level: number;
  readonly halfEast: number;
  readonly halfNorth: number;
}

/** Positive above the elevation of this sine, which must be airless. */
export function elevationBoundary(level: number): Boundary {
  return { east: 0, north: 0, up: 1, level, halfEast: 0, halfNorth: 0 };
}

/** Positive clockwise of the azimuth. */
export function azimuthBoundary(azimuthDeg: number): Boundary {
  const sin = Math.sin(azimuthDeg * DEG);
  const cos = Math.cos(azimuthDeg * DEG);
  return { east: cos, north: -sin, up: 0, level: 0, halfEast: sin, halfNorth: cos };
}

export function boundaryValue(boundary: Boundary, direction: Float64Array): number {
  return (
    boundary.east * direction[0]! +
    boundary.north * direction[1]! +
    boundary.up * direction[2]! -
    boundary.level
  );
}

/** Whether a direction on the plane of the boundary lies on the half that is meant. */
export function onMeantHalf(boundary: Boundary, direction: Float64Array): boolean {
  return boundary.halfEast * direction[0]! + boundary.halfNorth * direction[1]! > -1e-9;
}
