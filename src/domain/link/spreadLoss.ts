import { toDb } from './decibel';
import type { ModeFigures } from './modes';

/**
 * Loss because the echo is wider than the mode's tones, dB: 0 while the half-power width W stays within the tone
 * spacing S; wider, the same energy must be gathered from W/S as much noise, which costs half its decibels when it
 * is summed incoherently: 5 log(W/S), that is 1 dB at W = 1.6 S and 3 dB at 4 S. An estimate of ±1 dB, growing
 * beyond 4 S, where neighbouring tones run into each other: choose a wider submode there.
 */
export function spreadLossDb(mode: ModeFigures, halfPowerHz: number): number {
  if (mode.resolutionHz === null || halfPowerHz <= mode.resolutionHz) return 0;
  return toDb(halfPowerHz / mode.resolutionHz) / 2;
}
