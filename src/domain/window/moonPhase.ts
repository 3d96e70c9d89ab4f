import type { MoonTable } from '../ephemeris/table';

/** How the Moon is lit: share of the disc, 0 … 1, and whether it is growing. */
export interface MoonPhase {
  illuminated: number;
  waxing: boolean;
}

/** Phase seen from the centre of the Earth. */
export function moonPhase(table: MoonTable, timeMs: number): MoonPhase {
  const moon = new Float64Array(3);
  const sun = new Float64Array(3);
  table.moonEarthFixed(timeMs, moon);
  table.sunEarthFixed(timeMs, sun);
  const [mx, my, mz] = [moon[0]!, moon[1]!, moon[2]!];
  const [sx, sy, sz] = [sun[0]!, sun[1]!, sun[2]!];
  const cosine = (mx * sx + my * sy + mz * sz) / (Math.hypot(mx, my, mz) * Math.hypot(sx, sy, sz));
  // East of the Sun, seen from the north: the Moon is growing.
  return { illuminated: (1 - cosine) / 2, waxing: sx * my - sy * mx > 0 };
}
