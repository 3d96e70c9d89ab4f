import { describe, expect, it } from 'vitest';
import { outlookDays } from '~/domain/outlook/year';
import { DAY_MS } from '~/domain/time/interval';

const YEAR_MS = Date.UTC(2009, 0, 1);

/**
 * Best days of 2009 on 144 MHz: 1 May and 9 November (published; read in the source, CQ VHF). The choice also weighed
 * declination and Sun; what the outlook can confirm is that by degradation each is the best day of its month, and
 * near the best of the year.
 */
describe('the year 2009 on 144 MHz', () => {
  const days = outlookDays({
    fromMs: YEAR_MS,
    days: 365,
    frequencyMhz: 144,
    here: [],
    there: [],
  });
  const dayOf = (month: number, day: number) => (Date.UTC(2009, month - 1, day) - YEAR_MS) / DAY_MS;

  it.each([
    ['1 May', 5, 1],
    ['9 November', 11, 9],
  ])(
    'has least degradation around %s within a day, of two weeks either way',
    (_name, month, day) => {
      const at = dayOf(month, day);
      const around = days.slice(at - 13, at + 14);
      const least = Math.min(...around.map(({ degradationDb }) => degradationDb));
      const best = days.findIndex(({ degradationDb }) => degradationDb === least);
      expect(Math.abs(best - at)).toBeLessThanOrEqual(1);
      expect(least).toBeLessThan(1);
      const better = days.filter(({ degradationDb }) => degradationDb < least);
      expect(better.length).toBeLessThan(0.1 * days.length);
    },
  );

  it('keeps within what Moon and sky can do', () => {
    for (const day of days) {
      expect(day.distanceKm).toBeGreaterThan(356_000);
      expect(day.distanceKm).toBeLessThan(407_000);
      expect(Math.abs(day.declinationDeg)).toBeLessThan(28.8);
      expect(day.degradationDb).toBeGreaterThan(-0.01);
      expect(day.degradationDb).toBeLessThan(15);
    }
  });
});
