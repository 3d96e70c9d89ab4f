import { describe, expect, it } from 'vitest';
import { bestWeekends, weekendsOf } from '~/domain/outlook/weekends';
import { hoursText, weekendName, weekendSentence, yearSentence } from '~/domain/outlook/sentences';
import type { OutlookDay } from '~/domain/outlook/year';
import { DAY_MS } from '~/domain/time/interval';

/** A Friday. */
const FROM_MS = Date.UTC(2027, 0, 1);

/** Days from Friday 1 January 2027 on, all alike but for what is given by index. */
function daysOf(count: number, given: Record<number, Partial<OutlookDay>> = {}): OutlookDay[] {
  return Array.from({ length: count }, (_, index) => ({
    startMs: FROM_MS + index * DAY_MS,
    distanceKm: 380_000 - index,
    declinationDeg: 12.2,
    sunSeparationDeg: 90,
    degradationDb: 2,
    skyLossDb: 0.1,
    commonHours: 4,
    ...given[index],
  }));
}

/** The same for both days of the weekend with this number, from 0. */
function both(weekend: number, given: Partial<OutlookDay>): Record<number, Partial<OutlookDay>> {
  return { [1 + 7 * weekend]: given, [2 + 7 * weekend]: given };
}

const ranks = (given: Record<number, Partial<OutlookDay>>) =>
  bestWeekends(weekendsOf(daysOf(28, given)), 12).map(({ at }) => (at - 1) / 7);

describe('weekends', () => {
  it('are the Saturdays that have a Sunday', () => {
    expect(weekendsOf(daysOf(9)).map(({ at }) => at)).toEqual([1]);
    expect(weekendsOf(daysOf(10)).map(({ at }) => at)).toEqual([1, 8]);
  });

  it('of the same worth stay in order of time', () => {
    expect(ranks({})).toEqual([0, 1, 2, 3]);
  });

  it('rank by degradation', () => {
    expect(ranks({ ...both(2, { degradationDb: 0.5 }), ...both(3, { degradationDb: 1 }) })).toEqual(
      [2, 3, 0, 1],
    );
  });

  it('gain 1 dB with twice the hours, up to 24', () => {
    const twice = weekendsOf(daysOf(14, both(1, { commonHours: 8 })));
    expect(twice[1]!.score - twice[0]!.score).toBeCloseTo(1, 9);
    const [day, more] = weekendsOf(
      daysOf(14, { ...both(0, { commonHours: 12 }), ...both(1, { commonHours: 20 }) }),
    );
    expect(more!.score).toBe(day!.score);
  });

  it('lose 3 dB when the Sun comes within 15° on either day', () => {
    const [far, near] = weekendsOf(daysOf(14, { 9: { sunSeparationDeg: 14.9 } }));
    expect(near!.score - far!.score).toBeCloseTo(-3, 9);
    expect(near!.sunSeparationDeg).toBe(14.9);
  });

  it('without hours in common are not listed, however near the Moon', () => {
    expect(ranks(both(1, { degradationDb: 0, commonHours: 0 }))).toEqual([0, 2, 3]);
  });
});

describe('the reason of a weekend', () => {
  const sentence = (given: Record<number, Partial<OutlookDay>>, weekend = 1) => {
    const days = daysOf(28, given);
    return weekendSentence(weekendsOf(days)[weekend]!, days);
  };

  it('names perigee, declination, sky, hours and Sun', () => {
    const given = {
      8: { distanceKm: 361_000, declinationDeg: 24.4, commonHours: 3 },
      9: { distanceKm: 360_000, declinationDeg: 23.8, commonHours: 4 },
      10: { distanceKm: 362_000 },
    };
    expect(sentence(given)).toBe(
      'Moon near perigee, 24° north, cold sky behind it, 7 h common; the Sun 90° away.',
    );
  });

  it('says perigee or apogee only within two days of the least or greatest distance', () => {
    expect(sentence({ 11: { distanceKm: 360_000 } })).toMatch(/^Moon near perigee,/);
    expect(sentence({ 12: { distanceKm: 360_000 }, 13: { distanceKm: 370_000 } })).toMatch(
      /^Moon nearer than its mean and closing,/,
    );
    expect(sentence({ 6: { distanceKm: 406_000 } })).toMatch(/^Moon near apogee,/);
  });

  it('says from which side of its mean the Moon comes', () => {
    const rising = Object.fromEntries(
      Array.from({ length: 28 }, (_, day) => [day, { distanceKm: 380_000 + 600 * day }]),
    );
    expect(sentence(rising)).toMatch(/^Moon farther than its mean and receding,/);
  });

  it('tells a declination that changes, sides included', () => {
    const at = (first: number, second: number) =>
      sentence({ 8: { declinationDeg: first }, 9: { declinationDeg: second } });
    expect(at(19.2, 12.8)).toContain(', 19° to 13° north,');
    expect(at(3.9, -2.1)).toContain(', 4° north to 2° south,');
    expect(at(-0.2, 0.4)).toContain(', on the equator,');
    expect(at(-0.2, 6.4)).toContain(', on the equator to 6° north,');
    expect(at(-27, -28.4)).toContain(', 27° to 28° south,');
  });

  it.each([
    [0.29, 'cold sky behind it'],
    [0.99, 'fairly cold sky behind it'],
    [2.04, 'warm sky behind it (2.0 dB)'],
    [6.55, 'the Milky Way behind it (6.5 dB)'],
  ])('calls %s dB of sky “%s”', (skyLossDb, words) => {
    expect(sentence(both(1, { skyLossDb }))).toContain(`, ${words},`);
  });

  it('says when the Sun is close and when the Moon is never up for both', () => {
    expect(sentence({ 9: { sunSeparationDeg: 6.3 } })).toMatch(/; the Sun only 6° away\.$/);
    expect(sentence(both(1, { commonHours: 0 }))).toContain(', never up for both;');
  });
});

describe('words of the outlook', () => {
  it('name a weekend, over the end of a month too', () => {
    const days = daysOf(40);
    const weekends = weekendsOf(days);
    expect(weekendName(weekends[0]!)).toBe('Sat 2 – Sun 3 Jan 2027');
    expect(weekendName(weekends[4]!)).toBe('Sat 30 – Sun 31 Jan 2027');
    const march = {
      saturday: { ...days[0]!, startMs: Date.UTC(2027, 6, 31) },
      sunday: { ...days[0]!, startMs: Date.UTC(2027, 7, 1) },
    };
    expect(weekendName(march)).toBe('Sat 31 Jul – Sun 1 Aug 2027');
  });

  it('give hours no finer than they are known', () => {
    expect([0.66, 2.5, 3.4, 14.6].map(hoursText)).toEqual(['40 min', '2 h 30 min', '3 h', '15 h']);
  });

  it('sum the year up', () => {
    const days = daysOf(14, both(1, { commonHours: 0 }));
    expect(yearSentence(days, weekendsOf(days))).toBe(
      '48 common hours on 12 of 14 days; 1 of 2 weekends have some.',
    );
    const never = days.map((day) => ({ ...day, commonHours: 0 }));
    expect(yearSentence(never, weekendsOf(never))).toMatch(/never stands above both/);
  });
});
