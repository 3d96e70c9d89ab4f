import { DEG, wrap180, wrap360 } from '../ephemeris/constants';
import { refracted } from '../ephemeris/refraction';
import type { StationTrack } from '../ephemeris/track';
import { onMeantHalf, boundaryValue, type Boundary } from '../sky/boundary';
import { profileMarginDeg, type CompiledSky } from '../sky/compile';
import { lastPointBefore, profileElevationDeg, type HorizonProfile } from '../sky/profile';
import { bracketedRoot, crossingsAroundTurn, type TimeFunction } from './roots';

/** Between nodes the sine of elevation leaves the range of its ends by less than this. */
const BULGE = 0.002;
/** Above this sine of elevation azimuth runs so fast that the whole profile is looked at in short steps. */
const NEAR_ZENITH = Math.sin(75 * DEG);
const NEAR_ZENITH_PARTS = 8;
/** A dip that stays this far from zero is not searched, degrees. */
const GRAZING_DEG = 0.03;
/** A piece so short is a wall of the profile, crossed at once. */
const STEEP_MS = 20;

/** Height of the Moon above the profile, degrees. */
class Margin implements TimeFunction {
  readonly #direction = new Float64Array(3);

  constructor(
    readonly track: StationTrack,
    readonly sky: CompiledSky,
  ) {}

  evaluate(timeMs: number): number {
    const direction = this.#direction;
    this.track.direction(timeMs, direction);
    return profileMarginDeg(this.sky, direction[0]!, direction[1]!, direction[2]!);
  }
}

/** Side of the Moon against the vertical plane through one point of the profile. */
class PlaneSide implements TimeFunction {
  readonly direction = new Float64Array(3);
  boundary: Boundary | undefined;

  constructor(readonly track: StationTrack) {}

  evaluate(timeMs: number): number {
    this.track.direction(timeMs, this.direction);
    return boundaryValue(this.boundary!, this.direction);
  }
}

/** Finds where the Moon crosses a station's horizon profile. */
export class ProfileSearch {
  readonly #margin: Margin;
  readonly #plane: PlaneSide;
  readonly #from = new Float64Array(3);
  readonly #middle = new Float64Array(3);
  readonly #to = new Float64Array(3);

  constructor(
    readonly track: StationTrack,
    readonly sky: CompiledSky,
    readonly profile: HorizonProfile,
  ) {
    this.#margin = new Margin(track, sky);
    this.#plane = new PlaneSide(track);
  }

  /** Appends every crossing between two grid nodes, unsorted. */
  crossings(first: number, last: number, edges: number[]): void {
    const { east, north, up } = this.track;
    for (let node = first; node < last; node += 1) {
      const lowSin = Math.min(up[node]!, up[node + 1]!) - BULGE;
      if (lowSin > this.sky.profileHighSin) continue;
      const highSin = Math.max(up[node]!, up[node + 1]!) + BULGE;
      const fromMs = this.track.nodeMs(node);
      const toMs = this.track.nodeMs(node + 1);
      if (highSin > NEAR_ZENITH) {
        this.#nearZenith(fromMs, toMs, edges);
        continue;
      }
      const startAz = Math.atan2(east[node]!, north[node]!) / DEG;
      const sweptDeg = wrap180(Math.atan2(east[node + 1]!, north[node + 1]!) / DEG - startAz);
      const padDeg = 0.5 + Math.abs(sweptDeg) / 4;
      const fromAz = wrap360(startAz + Math.min(sweptDeg, 0) - padDeg);
      const widthDeg = Math.abs(sweptDeg) + 2 * padDeg;
      const points = pointsWithin(this.profile, fromAz, widthDeg);
      if (this.#mayMeet(points, fromAz, widthDeg, lowSin, highSin)) {
        this.#stretch(points, fromMs, toMs, edges);
      }
    }
  }

  #nearZenith(fromMs: number, toMs: number, edges: number[]): void {
    const everywhere = Array.from(this.profile.azimuthsDeg.keys());
    const stepMs = (toMs - fromMs) / NEAR_ZENITH_PARTS;
    for (let part = 0; part < NEAR_ZENITH_PARTS; part += 1) {
      this.#stretch(everywhere, fromMs + part * stepMs, fromMs + (part + 1) * stepMs, edges);
    }
  }

  /** Whether the Moon's elevations in a step overlap the profile's in the azimuths that it sweeps. */
  #mayMeet(
    points: readonly number[],
    fromAz: number,
    widthDeg: number,
    lowSin: number,
    highSin: number,
  ): boolean {
    const { profile } = this;
    const atFrom = profileElevationDeg(profile, fromAz);
    const atTo = profileElevationDeg(profile, wrap360(fromAz + widthDeg));
    let lowest = Math.min(atFrom, atTo);
    let highest = Math.max(atFrom, atTo);
    for (const point of points) {
      lowest = Math.min(lowest, profile.elevationsDeg[point]!);
      highest = Math.max(highest, profile.elevationsDeg[point]!);
    }
    return this.#appearsDeg(lowSin) <= highest && this.#appearsDeg(highSin) >= lowest;
  }

  #appearsDeg(sine: number): number {
    const airlessDeg = Math.asin(Math.max(-1, Math.min(1, sine))) / DEG;
    return this.sky.refraction ? refracted(airlessDeg) : airlessDeg;
  }

  /**
   * Crossings within one short stretch. It is cut where the Moon passes the azimuth of a point of the profile, so
   * that the profile is one straight line in each piece and a narrow mast or gap cannot slip between two looks.
   */
  #stretch(points: readonly number[], fromMs: number, toMs: number, edges: number[]): void {
    const cuts = this.#azimuthPasses(points, fromMs, toMs);
    cuts.sort((a, b) => a - b);
    cuts.push(toMs);
    const margin = this.#margin;
    let startMs = fromMs;
    let start = margin.evaluate(fromMs);
    for (const endMs of cuts) {
      const end = margin.evaluate(endMs);
      if (endMs - startMs < STEEP_MS) {
        if (start < 0 !== end < 0) edges.push(startMs, endMs);
      } else {
        const middle = margin.evaluate((startMs + endMs) / 2);
        pieceRoots(margin, startMs, start, endMs, end, middle, GRAZING_DEG, edges);
      }
      startMs = endMs;
      start = end;
    }
  }

  /** Instants within a stretch at which the Moon passes the azimuths of the given points of the profile. */
  #azimuthPasses(points: readonly number[], fromMs: number, toMs: number): number[] {
    const passes: number[] = [];
    if (points.length === 0) return passes;
    const plane = this.#plane;
    this.track.direction(fromMs, this.#from);
    this.track.direction((fromMs + toMs) / 2, this.#middle);
    this.track.direction(toMs, this.#to);
    const found: number[] = [];
    for (const point of points) {
      const boundary = this.sky.profileBoundaries[point]!;
      plane.boundary = boundary;
      const start = boundaryValue(boundary, this.#from);
      const middle = boundaryValue(boundary, this.#middle);
      const end = boundaryValue(boundary, this.#to);
      found.length = 0;
      pieceRoots(plane, fromMs, start, toMs, end, middle, GRAZING_DEG * DEG, found);
      for (const timeMs of found) {
        this.track.direction(timeMs, plane.direction);
        if (onMeantHalf(boundary, plane.direction)) passes.push(timeMs);
      }
    }
    return passes;
  }
}

/** Indices of the profile's points in the clockwise range from `fromAz` (0 … below 360). */
function pointsWithin(profile: HorizonProfile, fromAz: number, widthDeg: number): number[] {
  const count = profile.azimuthsDeg.length;
  const points: number[] = [];
  let index = (lastPointBefore(profile, fromAz) + 1) % count;
  while (points.length < count && wrap360(profile.azimuthsDeg[index]! - fromAz) <= widthDeg) {
    points.push(index);
    index = (index + 1) % count;
  }
  return points;
}

/** Appends the zeros of a function that is smooth between the ends, with at most one extremum there. */
function pieceRoots(
  f: TimeFunction,
  fromMs: number,
  start: number,
  toMs: number,
  end: number,
  middle: number,
  grazing: number,
  roots: number[],
): void {
  const middleMs = (fromMs + toMs) / 2;
  const turnsEarly = start < 0 !== middle < 0;
  const turnsLate = middle < 0 !== end < 0;
  if (turnsEarly) roots.push(bracketedRoot(f, fromMs, middleMs, start, middle));
  if (turnsLate) roots.push(bracketedRoot(f, middleMs, toMs, middle, end));
  if (turnsEarly || turnsLate) return;
  const bend = start - 2 * middle + end;
  const slope = start - end;
  if (Math.abs(slope) > 4.5 * Math.abs(bend) || bend === 0) return;
  const extreme = middle - (slope * slope) / (8 * bend);
  if (extreme < 0 === middle < 0 && Math.abs(extreme) > grazing) return;
  crossingsAroundTurn(f, fromMs, toMs, middle < 0, roots);
}
