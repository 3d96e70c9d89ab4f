import { wrap360 } from '../ephemeris/constants';

/** Width of the clockwise range from … to, above 0 … 360; equal ends mean the full circle. */
export function azimuthWidthDeg(fromDeg: number, toDeg: number): number {
  return wrap360(toDeg - fromDeg) || 360;
}

/** Whether an azimuth lies in the clockwise range from … to, ends included. */
export function azimuthWithin(azimuthDeg: number, fromDeg: number, toDeg: number): boolean {
  return wrap360(azimuthDeg - fromDeg) <= azimuthWidthDeg(fromDeg, toDeg);
}
