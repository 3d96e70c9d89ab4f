import { DEG, wrap360 } from '../ephemeris/constants';
import { refracted, unrefracted } from '../ephemeris/refraction';
import { azimuthWidthDeg } from './azimuth';
import { azimuthBoundary, elevationBoundary, type Boundary } from './boundary';
import type { BlockedSector, SkyLimits } from './limits';
import { prepareProfile, profileElevationDeg, type HorizonProfile } from './profile';

/** What forbids a direction. In this order they are asked, and the first that forbids is named. */
export const SKY_REASONS = [
  'horizon',
  'horizonProfile',
  'elevationLimit',
  'transmitElevation',
  'azimuthLimit',
  'blockedSector',
] as const;

export type SkyReason = (typeof SKY_REASONS)[number];

export interface SkyCause {
  reason: SkyReason;
  /** Name of the blocked sector, where it has one. */
  name?: string | undefined;
}

export interface AzimuthSpan {
  readonly from: Boundary;
  readonly to: Boundary;
  readonly widthDeg: number;
}

export interface Sector {
  readonly span: AzimuthSpan;
  readonly lowSin: number;
  readonly highSin: number;
}

/**
 * The limits of one station, ready for millions of questions. Elevations are held airless: with refraction each
 * limit is lowered by what the atmosphere lifts there.
 *
 * The geometric horizon, 0°, limits unless the station says that it sees lower: by a horizon profile with a
 * point below 0°, which then is the horizon all around, or, without a profile, by a negative `elevationFromDeg`.
 */
export interface CompiledSky {
  readonly refraction: boolean;
  readonly profile: HorizonProfile | null;
  /** Below this sine of elevation nothing is seen, whatever the azimuth, for `causes[floorCode]`. */
  readonly floorSin: number;
  readonly floorCode: number;
  readonly boundaries: readonly Boundary[];
  /** Cause of each code that `skyCode` returns; 0 means free. */
  readonly causes: readonly (SkyCause | null)[];
  readonly lowSin: number;
  readonly highSin: number;
  readonly transmitSin: number;
  readonly azimuth: AzimuthSpan | null;
  readonly sectors: readonly Sector[];
  /** Vertical planes through the points of the profile. */
  readonly profileBoundaries: readonly Boundary[];
  /** Above this sine of elevation the profile cannot matter. */
  readonly profileHighSin: number;
}

const HORIZON = 1;
const PROFILE = 2;
const ELEVATION = 3;
const TRANSMIT = 4;
const AZIMUTH = 5;
const FIRST_SECTOR = 6;

export function compileSky(limits: SkyLimits, refraction = false): CompiledSky {
  const profile = prepareProfile(limits.horizon);
  const from = limits.elevationFromDeg;
  const geometric = profile ? profile.lowestDeg >= 0 : from === undefined || from >= 0;
  const floorDeg = geometric ? 0 : profile ? profile.lowestDeg : from!;
  const sectors = (limits.blocked ?? []).map((sector) => compileSector(sector, refraction));
  const azimuth =
    limits.azimuthFromDeg === undefined || limits.azimuthToDeg === undefined
      ? null
      : azimuthSpan(limits.azimuthFromDeg, limits.azimuthToDeg);
  const elevations = [floorDeg, from, limits.elevationToDeg, limits.transmitElevationFromDeg];
  for (const sector of limits.blocked ?? []) {
    elevations.push(sector.elevationFromDeg, sector.elevationToDeg);
  }
  const spans = [azimuth, ...sectors.map((sector) => sector.span)];
  return {
    refraction,
    profile,
    floorSin: limitSine(floorDeg, refraction),
    floorCode: geometric ? HORIZON : profile ? PROFILE : ELEVATION,
    boundaries: [
      ...elevationBoundaries(elevations, floorDeg, refraction),
      ...spans.flatMap((span) => (span && span.widthDeg < 360 ? [span.from, span.to] : [])),
    ],
    causes: [
      null,
      ...SKY_REASONS.slice(0, FIRST_SECTOR - 1).map((reason) => ({ reason })),
      ...(limits.blocked ?? []).map(({ name }) => ({ reason: 'blockedSector' as const, name })),
    ],
    lowSin: sineOr(-2, from, refraction),
    highSin: sineOr(2, limits.elevationToDeg, refraction),
    transmitSin: sineOr(-2, limits.transmitElevationFromDeg, refraction),
    azimuth,
    sectors,
    profileBoundaries: profile ? Array.from(profile.azimuthsDeg, azimuthBoundary) : [],
    profileHighSin: sineOr(-2, profile?.highestDeg, refraction),
  };
}

/** Sine of the airless elevation at which a limit lies. */
export function limitSine(elevationDeg: number, refraction: boolean): number {
  return Math.sin((refraction ? unrefracted(elevationDeg) : elevationDeg) * DEG);
}

/** The sine of a limit that may be absent. */
function sineOr(without: number, elevationDeg: number | undefined, refraction: boolean): number {
  return elevationDeg === undefined ? without : limitSine(elevationDeg, refraction);
}

export function azimuthSpan(fromDeg: number, toDeg: number): AzimuthSpan {
  return {
    from: azimuthBoundary(fromDeg),
    to: azimuthBoundary(toDeg),
    widthDeg: azimuthWidthDeg(fromDeg, toDeg),
  };
}

export function compileSector(sector: BlockedSector, refraction: boolean): Sector {
  return {
    span: azimuthSpan(sector.azimuthFromDeg, sector.azimuthToDeg),
    lowSin: sector.elevationFromDeg <= -90 ? -2 : limitSine(sector.elevationFromDeg, refraction),
    highSin: sector.elevationToDeg >= 90 ? 2 : limitSine(sector.elevationToDeg, refraction),
  };
}

/** One boundary for each different elevation that can matter. */
function elevationBoundaries(
  elevationsDeg: readonly (number | undefined)[],
  floorDeg: number,
  refraction: boolean,
): Boundary[] {
  const wanted = elevationsDeg.filter(
    (el): el is number => el !== undefined && el >= floorDeg && el < 90,
  );
  return [...new Set(wanted)].map((el) => elevationBoundary(limitSine(el, refraction)));
}

export function spanHolds(span: AzimuthSpan, east: number, north: number): boolean {
  if (span.widthDeg >= 360) return true;
  const afterFrom = span.from.east * east + span.from.north * north >= 0;
  const beforeTo = span.to.east * east + span.to.north * north <= 0;
  return span.widthDeg <= 180 ? afterFrom && beforeTo : afterFrom || beforeTo;
}

/** Code of the first limit that forbids the unit direction (east, north, up), or 0. */
export function skyCode(sky: CompiledSky, east: number, north: number, up: number): number {
  if (up < sky.floorSin) return sky.floorCode;
  if (up < sky.profileHighSin && profileMarginDeg(sky, east, north, up) < 0) return PROFILE;
  if (up < sky.lowSin || up > sky.highSin) return ELEVATION;
  if (up < sky.transmitSin) return TRANSMIT;
  if (sky.azimuth && !spanHolds(sky.azimuth, east, north)) return AZIMUTH;
  for (let index = 0; index < sky.sectors.length; index += 1) {
    const sector = sky.sectors[index]!;
    if (up >= sector.lowSin && up <= sector.highSin && spanHolds(sector.span, east, north)) {
      return FIRST_SECTOR + index;
    }
  }
  return 0;
}

/** How far the direction stands above the horizon profile, degrees; +∞ without a profile. */
export function profileMarginDeg(
  sky: CompiledSky,
  east: number,
  north: number,
  up: number,
): number {
  if (!sky.profile) return Infinity;
  const airlessDeg = Math.asin(Math.max(-1, Math.min(1, up))) / DEG;
  const elevationDeg = sky.refraction ? refracted(airlessDeg) : airlessDeg;
  const azimuthDeg = wrap360(Math.atan2(east, north) / DEG);
  return elevationDeg - profileElevationDeg(sky.profile, azimuthDeg);
}
