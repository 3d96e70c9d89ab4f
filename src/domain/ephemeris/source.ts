import { DEG } from './constants';
import { astroTime, moonOfDate, siderealDeg } from './engine';
import { toEarthFixed } from './observer';

/** Anything that tells the Earth-fixed geocentric Moon in km: a `MoonTable`, or `directMoon` without one. */
export interface MoonSource {
  moonEarthFixed(timeMs: number, out: Float64Array): void;
}

export const directMoon: MoonSource = {
  moonEarthFixed(timeMs, out) {
    const time = astroTime(timeMs);
    const moon = toEarthFixed(moonOfDate(time), siderealDeg(time) * DEG);
    out.set(moon);
  },
};
