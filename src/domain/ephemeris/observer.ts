import type { Site } from '../sky/limits';
import { DEG, wrap360 } from './constants';
import type { Vector } from './engine';

const WGS84_RADIUS_KM = 6378.137;
const WGS84_FLATTENING = 1 / 298.257_223_563;
const WGS84_E2 = WGS84_FLATTENING * (2 - WGS84_FLATTENING);

/** A site as Earth-fixed vectors: place in km, and unit vectors of its geodetic east, north and up. */
export interface Observer {
  readonly place: Vector;
  readonly east: Vector;
  readonly north: Vector;
  readonly up: Vector;
}

/** Frame: WGS 84, x towards 0° N 0° E, z towards the north pole; polar motion is taken as zero. */
export function observerAt(site: Site): Observer {
  const latitude = site.latitudeDeg * DEG;
  const longitude = site.longitudeDeg * DEG;
  const sinLat = Math.sin(latitude);
  const cosLat = Math.cos(latitude);
  const sinLon = Math.sin(longitude);
  const cosLon = Math.cos(longitude);
  const normalKm = WGS84_RADIUS_KM / Math.sqrt(1 - WGS84_E2 * sinLat * sinLat);
  const heightKm = site.heightM / 1000;
  const acrossKm = (normalKm + heightKm) * cosLat;
  return {
    place: [acrossKm * cosLon, acrossKm * sinLon, (normalKm * (1 - WGS84_E2) + heightKm) * sinLat],
    east: [-sinLon, cosLon, 0],
    north: [-sinLat * cosLon, -sinLat * sinLon, cosLat],
    up: [cosLat * cosLon, cosLat * sinLon, sinLat],
  };
}

export interface LookAngles {
  /** From true north through east, 0 … below 360. */
  azimuthDeg: number;
  /** Airless, above the geodetic horizon. */
  elevationDeg: number;
  /** Geometric distance from the site. */
  rangeKm: number;
}

/** Look angles of an Earth-fixed geocentric vector in km. At the zenith itself the azimuth has no meaning. */
export function lookAngles(observer: Observer, body: Vector): LookAngles {
  const x = body[0] - observer.place[0];
  const y = body[1] - observer.place[1];
  const z = body[2] - observer.place[2];
  const east = x * observer.east[0] + y * observer.east[1];
  const north = x * observer.north[0] + y * observer.north[1] + z * observer.north[2];
  const up = x * observer.up[0] + y * observer.up[1] + z * observer.up[2];
  const across = Math.hypot(east, north);
  return {
    azimuthDeg: wrap360(Math.atan2(east, north) / DEG),
    elevationDeg: Math.atan2(up, across) / DEG,
    rangeKm: Math.hypot(across, up),
  };
}

/** Angle between two Earth-fixed bodies as seen from the place, degrees 0 … 180. */
export function separationDeg(place: Vector, first: Vector, second: Vector): number {
  const a: Vector = [first[0] - place[0], first[1] - place[1], first[2] - place[2]];
  const b: Vector = [second[0] - place[0], second[1] - place[1], second[2] - place[2]];
  const cross = Math.hypot(
    a[1] * b[2] - a[2] * b[1],
    a[2] * b[0] - a[0] * b[2],
    a[0] * b[1] - a[1] * b[0],
  );
  return Math.atan2(cross, a[0] * b[0] + a[1] * b[1] + a[2] * b[2]) / DEG;
}

/** Turns a vector of date into the Earth-fixed frame, given the sidereal angle. */
export function toEarthFixed(vector: Vector, siderealRad: number): Vector {
  const cos = Math.cos(siderealRad);
  const sin = Math.sin(siderealRad);
  return [vector[0] * cos + vector[1] * sin, vector[1] * cos - vector[0] * sin, vector[2]];
}
