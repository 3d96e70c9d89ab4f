import { describe, expect, it } from 'vitest';
import { startInWindow } from '~/domain/sked/rasterMonth';
import { HOUR_MS, MINUTE_MS } from '~/domain/time/interval';

const START_MS = Date.UTC(2027, 0, 20, 20, 2);
const window = { startMs: START_MS, endMs: START_MS + 4 * HOUR_MS };
const SLOT_MS = 45 * MINUTE_MS;
const at = (hour: number, minute: number) => Date.UTC(2027, 0, 20, hour, minute);

describe('the start of a slot in a window that was pressed', () => {
  it('is where it was pressed, on full five minutes', () => {
    expect(startInWindow(window, SLOT_MS, at(21, 13), 0)).toBe(at(21, 15));
  });

  it('keeps the slot inside the window at both ends', () => {
    expect(startInWindow(window, SLOT_MS, at(20, 2), 0)).toBe(at(20, 5));
    expect(startInWindow(window, SLOT_MS, at(23, 59), 0)).toBe(at(23, 15));
  });

  it('lies around the best moment when no place was pressed', () => {
    const best = { ...window, best: { timeMs: at(22, 30) } };
    expect(startInWindow(best, SLOT_MS, null, 0)).toBe(at(22, 10));
  });

  it('is never past', () => {
    expect(startInWindow(window, SLOT_MS, at(20, 30), at(21, 1))).toBe(at(21, 10));
  });
});
