import { HOUR_MS } from '../time/interval';
import { QUALITY_NAMES, worthDb, type Quality, type QualityBasis } from './quality';
import type { CommonWindow } from './types';

/** Twice the length weighs as much as this, up to the longest length that counts. */
const DB_PER_DOUBLING = 0.5;
const LONGEST_COUNTED_HOURS = 4;

/** How windows are ranked, for people. */
export function rankingSentence(basis: QualityBasis): string {
  return `Ranked by ${QUALITY_NAMES[basis].toLowerCase()} at the best moment and length: twice the length counts as 0.5 dB, up to 4 hours.`;
}

export function windowScore(window: CommonWindow, quality: Quality): number {
  const hours = (window.endMs - window.startMs) / HOUR_MS;
  return worthDb(quality) + DB_PER_DOUBLING * Math.log2(Math.min(hours, LONGEST_COUNTED_HOURS));
}

/** Indices of the windows, best first; equal ones in order of time. */
export function bestFirst(windows: readonly CommonWindow[], quality: readonly Quality[]): number[] {
  const scores = windows.map((window, index) => windowScore(window, quality[index]!));
  return windows.map((_, index) => index).sort((a, b) => scores[b]! - scores[a]! || a - b);
}
