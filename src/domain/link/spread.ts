import {
  DEG,
  MOON_RADIUS_KM,
  SIDEREAL_RAD_PER_MS,
  SPEED_OF_LIGHT_MPS,
} from '../ephemeris/constants';
import { astroTime, moonPoleOfDate, siderealDeg, type Vector } from '../ephemeris/engine';
import { observerAt, toEarthFixed } from '../ephemeris/observer';
import { directMoon, type MoonSource } from '../ephemeris/source';
import type { Site } from '../sky/limits';

/** Sidereal rotation of the Moon: 13.17635815° a day (IAU report on rotational elements, read in the source). */
export const MOON_SPIN_RAD_PER_S = (13.17635815 * DEG) / 86_400;
const STEP_MS = 30_000;

/** How the direction from the Moon to a station turns, seen from the stars; frame Earth-fixed at the instant. */
export interface Libration {
  /** Unit vector from the Moon's centre to the station. */
  direction: Vector;
  /** Its rate, rad/s. */
  directionRate: Vector;
  /** The Moon's own rotation, rad/s. */
  spin: Vector;
}

/** Topocentric motion of one station as seen from the Moon; physical libration (under 0.05°) is left out. */
export function libration(site: Site, timeMs: number, source: MoonSource = directMoon): Libration {
  const { place } = observerAt(site);
  const before = fromMoon(source, place, timeMs, -STEP_MS);
  const after = fromMoon(source, place, timeMs, STEP_MS);
  const perSecond = 1000 / (2 * STEP_MS);
  const time = astroTime(timeMs);
  const pole = toEarthFixed(moonPoleOfDate(time), siderealDeg(time) * DEG);
  return {
    direction: fromMoon(source, place, timeMs, 0),
    directionRate: scale(subtract(after, before), perSecond),
    spin: scale(pole, MOON_SPIN_RAD_PER_S),
  };
}

const scratch = new Float64Array(3);

function fromMoon(source: MoonSource, place: Vector, timeMs: number, offsetMs: number): Vector {
  source.moonEarthFixed(timeMs + offsetMs, scratch);
  const away: Vector = [place[0] - scratch[0]!, place[1] - scratch[1]!, place[2] - scratch[2]!];
  const length = Math.hypot(...away);
  return toEarthFixed(scale(away, 1 / length), -SIDEREAL_RAD_PER_MS * offsetMs);
}

/**
 * Doppler spread from limb to limb, Hz: 2 R f |g⊥| / c with g = ṅ1 + ṅ2 + (n1 + n2) × ω; for the own echo leave
 * the second station out. Checked by finite differences of path lengths to the limb to 0.001 Hz (computed for the
 * project). The half-power width is a fraction of it, see `halfPowerSpreadShare`.
 */
export function spreadHz(frequencyMhz: number, first: Libration, second = first): number {
  const [ax, ay, az] = first.direction;
  const [bx, by, bz] = second.direction;
  const [wx, wy, wz] = first.spin;
  const sx = ax + bx;
  const sy = ay + by;
  const sz = az + bz;
  const gx = first.directionRate[0] + second.directionRate[0] + sy * wz - sz * wy;
  const gy = first.directionRate[1] + second.directionRate[1] + sz * wx - sx * wz;
  const gz = first.directionRate[2] + second.directionRate[2] + sx * wy - sy * wx;
  const along = (gx * sx + gy * sy + gz * sz) / (sx * sx + sy * sy + sz * sz);
  const px = gx - sx * along;
  const py = gy - sy * along;
  const pz = gz - sz * along;
  const across = Math.sqrt(px * px + py * py + pz * pz);
  return (2 * MOON_RADIUS_KM * 1000 * frequencyMhz * 1e6 * across) / SPEED_OF_LIGHT_MPS;
}

const SHARES: readonly (readonly [mhz: number, share: number])[] = [
  [1300, 0.3],
  [3400, 0.4],
  [10_368, 0.5],
  [24_048, 0.65],
  [47_088, 0.7],
];

/**
 * Half-power width of the echo as a share of its limb-to-limb spread: an estimate within ±30 %, after the
 * radar measurements in Evans & Pettengill 1963, J. Geophys. Res. 68, 423 (from memory). Log-linear between bands.
 */
export function halfPowerSpreadShare(frequencyMhz: number): number {
  for (let index = 1; index < SHARES.length; index += 1) {
    const [lowMhz, low] = SHARES[index - 1]!;
    const [highMhz, high] = SHARES[index]!;
    if (frequencyMhz <= lowMhz) return low;
    if (frequencyMhz <= highMhz) {
      return low + ((high - low) * Math.log(frequencyMhz / lowMhz)) / Math.log(highMhz / lowMhz);
    }
  }
  return SHARES.at(-1)![1];
}

function subtract(a: Vector, b: Vector): Vector {
  return [a[0] - b[0], a[1] - b[1], a[2] - b[2]];
}

function scale(a: Vector, factor: number): Vector {
  return [a[0] * factor, a[1] * factor, a[2] * factor];
}
