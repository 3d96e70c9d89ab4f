import { DEG, SIDEREAL_RAD_PER_MS } from '../ephemeris/constants';
import { astroTime, moonPoleOfDate, siderealDeg, type Vector } from '../ephemeris/engine';
import { observerAt, type Observer } from '../ephemeris/observer';
import type { MoonTable } from '../ephemeris/table';
import type { Site } from '../sky/limits';
import { moonPhaseTerm } from './moonNoise';
import { MOON_SPIN_RAD_PER_S, type Libration } from './spread';

const EARTH_SPIN_RAD_PER_S = SIDEREAL_RAD_PER_MS * 1000;
const STEP_MS = 30_000;
/** The Moon's pole moves 0.001° in this time against the stars. */
const POLE_KEPT_MS = 43_200_000;
const COS_OBLIQUITY = Math.cos(23.437 * DEG);

/** What one station sees at the instant; filled anew by `PairGeometry.compute`. */
export interface StationView {
  /** Sine of the Moon's airless elevation. */
  sinElevation: number;
  rangeKm: number;
  /** Receding positive. */
  rangeRateMps: number;
  /** −180 … 180, positive west of the meridian. */
  parallacticDeg: number;
  sunSeparationDeg: number;
  sunElevationDeg: number;
  libration: Libration;
}

/**
 * Moon and Sun for two stations at one instant, from a Moon table, all by vectors and without allocation. The views
 * are overwritten by each call.
 */
export class PairGeometry {
  readonly table: MoonTable;
  readonly first: StationView;
  readonly second: StationView;
  /** See `moonPhaseTerm`. */
  phaseTerm = 0;
  readonly #observers: readonly [Observer, Observer];
  readonly #spin: Vector = [0, 0, 0];
  readonly #before = new Float64Array(3);
  readonly #moon = new Float64Array(3);
  readonly #after = new Float64Array(3);
  readonly #sun = new Float64Array(3);
  #poleMs = Number.NaN;
  #pole: Vector = [0, 0, 1];
  #poleSiderealRad = 0;

  constructor(table: MoonTable, first: Site, second: Site) {
    this.table = table;
    this.#observers = [observerAt(first), observerAt(second)];
    this.first = emptyView(this.#spin);
    this.second = emptyView(this.#spin);
  }

  /** Sines of the elevations only, into the views; quick way to see whether the rest is worth computing. */
  computeElevations(timeMs: number): void {
    this.table.moonEarthFixed(timeMs, this.#moon);
    this.first.sinElevation = sinElevation(this.#observers[0], this.#moon);
    this.second.sinElevation = sinElevation(this.#observers[1], this.#moon);
  }

  /** Everything, after `computeElevations` of the same instant. */
  computeRest(timeMs: number): void {
    this.table.moonEarthFixed(timeMs - STEP_MS, this.#before);
    this.table.moonEarthFixed(timeMs + STEP_MS, this.#after);
    this.table.sunEarthFixed(timeMs, this.#sun);
    this.#turnSpin(timeMs);
    this.#view(this.#observers[0], this.first);
    this.#view(this.#observers[1], this.second);
    this.phaseTerm = phaseTermOf(this.#moon, this.#sun);
  }

  #turnSpin(timeMs: number): void {
    if (!(Math.abs(timeMs - this.#poleMs) < POLE_KEPT_MS)) {
      const time = astroTime(timeMs);
      this.#poleMs = timeMs;
      this.#poleSiderealRad = siderealDeg(time) * DEG;
      this.#pole = moonPoleOfDate(time);
    }
    const turnRad = this.#poleSiderealRad + SIDEREAL_RAD_PER_MS * (timeMs - this.#poleMs);
    const cos = Math.cos(turnRad) * MOON_SPIN_RAD_PER_S;
    const sin = Math.sin(turnRad) * MOON_SPIN_RAD_PER_S;
    const [x, y, z] = this.#pole;
    this.#spin[0] = x * cos + y * sin;
    this.#spin[1] = y * cos - x * sin;
    this.#spin[2] = z * MOON_SPIN_RAD_PER_S;
  }

  #view(observer: Observer, view: StationView): void {
    const [px, py, pz] = observer.place;
    const [zx, zy, zz] = observer.up;
    const dx = this.#moon[0]! - px;
    const dy = this.#moon[1]! - py;
    const dz = this.#moon[2]! - pz;
    const range = Math.sqrt(dx * dx + dy * dy + dz * dz);
    const ux = dx / range;
    const uy = dy / range;
    const uz = dz / range;
    view.rangeKm = range;

    const perSecond = 1000 / (2 * STEP_MS);
    const vx = (this.#after[0]! - this.#before[0]!) * perSecond;
    const vy = (this.#after[1]! - this.#before[1]!) * perSecond;
    const vz = (this.#after[2]! - this.#before[2]!) * perSecond;
    view.rangeRateMps = (ux * vx + uy * vy + uz * vz) * 1000;

    // Seen from the stars the vector Moon → station also turns with the Earth.
    const sx = -vx + EARTH_SPIN_RAD_PER_S * dy;
    const sy = -vy - EARTH_SPIN_RAD_PER_S * dx;
    const sz = -vz;
    const along = -(ux * sx + uy * sy + uz * sz);
    const { direction, directionRate } = view.libration;
    direction[0] = -ux;
    direction[1] = -uy;
    direction[2] = -uz;
    directionRate[0] = (sx + ux * along) / range;
    directionRate[1] = (sy + uy * along) / range;
    directionRate[2] = (sz + uz * along) / range;

    const across = ux * zy - uy * zx;
    view.parallacticDeg = Math.atan2(across, zz - uz * view.sinElevation) / DEG;

    const hx = this.#sun[0]! - px;
    const hy = this.#sun[1]! - py;
    const hz = this.#sun[2]! - pz;
    const sunRange = Math.sqrt(hx * hx + hy * hy + hz * hz);
    const cosSeparation = (ux * hx + uy * hy + uz * hz) / sunRange;
    view.sunSeparationDeg = Math.acos(Math.min(Math.max(cosSeparation, -1), 1)) / DEG;
    view.sunElevationDeg = Math.asin((zx * hx + zy * hy + zz * hz) / sunRange) / DEG;
  }
}

function emptyView(spin: Vector): StationView {
  return {
    sinElevation: 0,
    rangeKm: 0,
    rangeRateMps: 0,
    parallacticDeg: 0,
    sunSeparationDeg: 0,
    sunElevationDeg: 0,
    libration: { direction: [0, 0, 0], directionRate: [0, 0, 0], spin },
  };
}

function sinElevation({ place, up }: Observer, moon: Float64Array): number {
  const dx = moon[0]! - place[0];
  const dy = moon[1]! - place[1];
  const dz = moon[2]! - place[2];
  const range = Math.sqrt(dx * dx + dy * dy + dz * dz);
  return (dx * up[0] + dy * up[1] + dz * up[2]) / range;
}

/**
 * The elongation's sine is taken from the equator's plane and corrected by the obliquity: wrong by the Moon's
 * latitude at most, which moves the Moon's brightness by under 0.1 of its swing.
 */
function phaseTermOf(moon: Float64Array, sun: Float64Array): number {
  const scale =
    1 /
    Math.sqrt(
      (moon[0]! ** 2 + moon[1]! ** 2 + moon[2]! ** 2) *
        (sun[0]! ** 2 + sun[1]! ** 2 + sun[2]! ** 2),
    );
  const cos = (moon[0]! * sun[0]! + moon[1]! * sun[1]! + moon[2]! * sun[2]!) * scale;
  const sin = ((sun[0]! * moon[1]! - sun[1]! * moon[0]!) * scale) / COS_OBLIQUITY;
  return moonPhaseTerm(cos, sin);
}
