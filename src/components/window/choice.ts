import type { Interval } from '../../domain/time/interval';
import type { WindowLayers } from '../../domain/window/layers';
import { bestFirst } from '../../domain/window/ranking';
import type { CommonWindow } from '../../domain/window/types';
import { slotAround, slotAt } from './slot';

/** What the reader has chosen: a window, the hand of the clock, and the slot to offer. */
export interface Choice {
  /** An instant inside the chosen window, so that the choice lives on while limits move its edges. */
  atMs: number;
  cursorMs: number;
  slot: Interval;
}

export interface Chosen {
  index: number;
  window: CommonWindow;
  choice: Choice;
}

/** The choice made by pressing a window, at an instant or (null) as a whole. */
export function choiceOf(window: CommonWindow, atMs: number | null): Choice {
  const slot = atMs === null ? slotAround(window, window.best.timeMs) : slotAt(window, atMs);
  const cursorMs = atMs === null ? window.best.timeMs : slot.startMs;
  return {
    atMs: Math.min(Math.max(cursorMs, window.startMs), window.endMs),
    cursorMs,
    slot,
  };
}

/** The chosen window in an answer; without a choice, or where its window has gone, the best one. */
export function chosenIn(layers: WindowLayers, choice: Choice | null): Chosen | null {
  const at = layers.windows.findIndex(
    (window) => choice !== null && choice.atMs >= window.startMs && choice.atMs <= window.endMs,
  );
  if (at >= 0 && choice) return { index: at, window: layers.windows[at]!, choice };
  const best = bestFirst(layers.windows, layers.windowQuality)[0];
  if (best === undefined) return null;
  const window = layers.windows[best]!;
  return { index: best, window, choice: choiceOf(window, null) };
}
