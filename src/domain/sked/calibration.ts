import { moonDiameterDeg } from '../link';
import { atmosphereAt, atmosphereLossDb, atmosphereNoiseK } from '../link/atmosphere';
import { toDb } from '../link/decibel';
import { moonBrightness, moonNoiseK } from '../link/moonNoise';
import type { LinkSetup } from '../link/setup';
import { coldestOnPathK } from '../link/skyPath';
import { DEFAULT_SOLAR_FLUX_SFU } from '../link/sun';
import { terminalOf } from '../link/terminal';

/** Steps in noise that a station in order shows, dB. */
export interface CalibrationSteps {
  /** From cold sky to a load at 290 K at the feed. */
  loadDb: number;
  /** From cold sky to the Sun at the flux. */
  sunDb: number;
  fluxSfu: number;
  /** From cold sky to the Moon. */
  moonDb: number;
  /** System temperature on cold sky, K. */
  coldSystemK: number;
}

const LOAD_K = 290;
/** Elevation at which cold sky is usually looked for. */
const SIN_COLD_SKY_ELEVATION = Math.sin((45 * Math.PI) / 180);

/**
 * The steps expected of a setup: Y = (290 + T_rx)/(T_cold + T_rx) for the load (checks of the project's physics
 * sheet: 15 K sky and 30 K receiver give 8.52 dB), (T_sys + T_source)/T_sys for Sun and Moon. Cold sky is the coldest
 * of the Moon's path, seen at 45° of elevation. With a measured system what is not sky counts as receiver.
 */
export function calibrationSteps(
  setup: LinkSetup,
  frequencyMhz: number,
  moonRangeKm: number,
  fluxSfu = DEFAULT_SOLAR_FLUX_SFU,
): CalibrationSteps {
  const terminal = terminalOf(setup, frequencyMhz, fluxSfu);
  const atmosphere = atmosphereAt(frequencyMhz);
  const airDb = atmosphereLossDb(atmosphere, SIN_COLD_SKY_ELEVATION);
  const skyK = coldestOnPathK(terminal.beam) + atmosphereNoiseK(atmosphere, airDb);
  const coldSystemK = terminal.measured ? terminal.receiverK : terminal.steadyK + skyK;
  const receiverK = terminal.measured ? Math.max(terminal.receiverK - skyK, 0) : terminal.receiverK;
  const moonK = moonNoiseK(
    moonBrightness(frequencyMhz).meanK,
    moonDiameterDeg(moonRangeKm),
    terminal.beamwidthDeg,
  );
  return {
    loadDb: toDb((LOAD_K + receiverK) / coldSystemK),
    sunDb: toDb(1 + terminal.sun.onAxisK / coldSystemK),
    fluxSfu,
    moonDb: toDb(1 + moonK / coldSystemK),
    coldSystemK,
  };
}
