import { DEG } from '../ephemeris/constants';
import type { Polarization } from '../station/setup';
import { toDb } from './decibel';

/** Below this the ionosphere turns a linear wave by an unknown angle; above it hardly at all. */
export const FARADAY_UNKNOWN_BELOW_MHZ = 500;

/** Real feeds still hear this far down when crossed (20 to 25 dB). */
export const CROSSED_LOSS_DB = 22;

/** Linear against circular, and linear against linear at an unknown angle (mean of cos²). */
export const HALF_POWER_DB = toDb(2);

/**
 * Angle at the Moon from its hour circle to the station's vertical, degrees −180 … 180, positive west of the
 * meridian: tan q = sin H / (tan φ cos δ − sin δ cos H) (Meeus, Astronomical Algorithms ch. 14, from memory).
 * Topocentric hour angle and declination; meaningless at the zenith.
 */
export function parallacticAngleDeg(
  latitudeDeg: number,
  hourAngleDeg: number,
  declinationDeg: number,
): number {
  const [phi, hour, delta] = [latitudeDeg * DEG, hourAngleDeg * DEG, declinationDeg * DEG];
  const across = Math.sin(hour) * Math.cos(phi);
  const along = Math.sin(phi) * Math.cos(delta) - Math.sin(delta) * Math.cos(hour) * Math.cos(phi);
  return Math.atan2(across, along) / DEG;
}

/** The same angle from where the Moon is seen; azimuth from north through east. */
export function parallacticFromSkyDeg(
  latitudeDeg: number,
  azimuthDeg: number,
  elevationDeg: number,
): number {
  const [phi, az, el] = [latitudeDeg * DEG, azimuthDeg * DEG, elevationDeg * DEG];
  const across = -Math.cos(phi) * Math.sin(az);
  const along = Math.sin(phi) * Math.cos(el) - Math.cos(phi) * Math.cos(az) * Math.sin(el);
  return Math.atan2(across, along) / DEG;
}

/**
 * Turn between the two stations' horizontals as the Moon sees them, degrees 0 … below 180. A reflection keeps the
 * direction of a linear wave in the sky, so the same offset holds both ways.
 */
export function polarizationOffsetDeg(
  firstParallacticDeg: number,
  secondParallacticDeg: number,
): number {
  const offset = (firstParallacticDeg - secondParallacticDeg) % 180;
  const wrapped = offset < 0 ? offset + 180 : offset;
  return wrapped < 180 ? wrapped : 0;
}

/** Loss between two linear polarisations, dB: 20 log|cos θ|, taken positive, at most 22 dB. */
export function linearLossDb(angleDeg: number): number {
  return Math.min(-2 * toDb(Math.abs(Math.cos(angleDeg * DEG))), CROSSED_LOSS_DB);
}

/**
 * Faraday rotation, one way, degrees: 2.365e4 · B∥ · TEC / f² rad; B∥ in tesla, TEC in electrons/m², f in Hz.
 * Same sense up and down, so that it adds up over the path.
 */
export function faradayOneWayDeg(frequencyMhz: number, fieldT: number, tec: number): number {
  return (2.365e4 * fieldT * tec) / (frequencyMhz * 1e6) ** 2 / DEG;
}

/** One way through the whole ionosphere overhead with 1e17 electrons/m² at 100 MHz (read in the source). */
const TYPICAL_AT_100_MHZ_DEG = 380;

/**
 * Expectation of the Faraday rotation one way at the zenith, degrees, falling with f²; sun, season and hour make it
 * ten times less or more, and it is four times as much at 10° of elevation.
 */
export function typicalFaraday(frequencyMhz: number): {
  typical: number;
  least: number;
  most: number;
} {
  const typical = TYPICAL_AT_100_MHZ_DEG * (100 / frequencyMhz) ** 2;
  return { typical, least: typical / 10, most: typical * 10 };
}

/**
 * How one direction's polarisations meet. `fixed`: always this loss. `offset`: linear feeds, loss by the geometric
 * offset plus `extraDeg`. `unknown`: linear feeds whose angle the ionosphere makes unknown.
 */
export type PolarizationMeeting =
  | { kind: 'fixed'; lossDb: number }
  | { kind: 'offset'; extraDeg: number }
  | { kind: 'unknown'; extraDeg: number };

/**
 * A station that can rotate its linear feed turns it to what arrives; when it transmits to a fixed linear feed it
 * turns to suit the partner, which helps only where Faraday rotation is small. A circular station is named by the
 * sense it transmits and receives the other one, because the Moon reverses it (common practice, from memory): equal
 * names lose nothing, different ones are crossed.
 */
export function polarizationMeeting(
  transmit: Polarization,
  receive: Polarization,
  frequencyMhz: number,
): PolarizationMeeting {
  const fromCircular = isCircular(transmit);
  const toCircular = isCircular(receive);
  if (fromCircular && toCircular) {
    return { kind: 'fixed', lossDb: transmit === receive ? 0 : CROSSED_LOSS_DB };
  }
  if (fromCircular || toCircular) return { kind: 'fixed', lossDb: HALF_POWER_DB };
  if (receive === 'rotatable') return { kind: 'fixed', lossDb: 0 };
  const unknown = frequencyMhz < FARADAY_UNKNOWN_BELOW_MHZ;
  if (transmit === 'rotatable') {
    return unknown ? { kind: 'unknown', extraDeg: 0 } : { kind: 'fixed', lossDb: 0 };
  }
  return { kind: unknown ? 'unknown' : 'offset', extraDeg: transmit === receive ? 0 : 90 };
}

function isCircular(polarization: Polarization): boolean {
  return polarization === 'rightCircular' || polarization === 'leftCircular';
}

/** Loss to be written into a budget, dB; for an unknown angle that of the mean power, 3 dB. */
export function meetingLossDb(meeting: PolarizationMeeting, offsetDeg: number): number {
  if (meeting.kind === 'fixed') return meeting.lossDb;
  if (meeting.kind === 'unknown') return HALF_POWER_DB;
  return linearLossDb(offsetDeg + meeting.extraDeg);
}
