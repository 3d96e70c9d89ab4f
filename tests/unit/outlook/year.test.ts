import { describe, expect, it } from 'vitest';
import { moonSampleDirect } from '~/domain/ephemeris';
import { parseOutlookQuestion } from '~/domain/outlook/question';
import { REGIONS, regionNamed, regionStations } from '~/domain/outlook/regions';
import { outlookDays } from '~/domain/outlook/year';
import { DAY_MS, HOUR_MS } from '~/domain/time/interval';
import { findCommonWindows } from '~/domain/window';
import { pair } from '../../bench/pair';

const FROM_MS = Date.UTC(2027, 4, 20);

function outlook(here = [pair[0]], there = [pair[1]], days = 40) {
  return outlookDays({ fromMs: FROM_MS, days, frequencyMhz: 144.1, here, there });
}

describe('the outlook by day', () => {
  it('has the Moon of noon as the direct ephemeris has it', () => {
    const days = outlook();
    for (const day of [days[0]!, days[17]!, days[39]!]) {
      const noonMs = day.startMs + DAY_MS / 2;
      const sample = moonSampleDirect({ latitudeDeg: 0, longitudeDeg: 0, heightM: 0 }, noonMs);
      expect(day.distanceKm).toBeCloseTo(sample.geocentricDistanceKm, 0);
      expect(day.declinationDeg).toBeCloseTo(sample.declinationDeg, 3);
      // The sample is seen from the ground: the Moon's parallax is up to a degree.
      expect(Math.abs(day.sunSeparationDeg - sample.sunSeparationDeg)).toBeLessThan(1);
    }
  });

  it('has the hours of the common windows, parted at midnight', () => {
    const days = outlook();
    const span = { startMs: FROM_MS, endMs: FROM_MS + 40 * DAY_MS };
    const expected = new Array<number>(40).fill(0);
    for (const { startMs, endMs } of findCommonWindows({ ...span, stations: pair }).windows) {
      for (let day = 0; day < 40; day += 1) {
        const fromMs = Math.max(startMs, FROM_MS + day * DAY_MS);
        const toMs = Math.min(endMs, FROM_MS + (day + 1) * DAY_MS);
        if (toMs > fromMs) expected[day] = expected[day]! + (toMs - fromMs) / HOUR_MS;
      }
    }
    expect(expected.some((hours) => hours > 1)).toBe(true);
    days.forEach(({ commonHours }, day) => expect(commonHours).toBeCloseTo(expected[day]!, 9));
  });

  it('takes the mean over the pairs of places of two regions', () => {
    const europe = regionStations('Europe').slice(0, 2);
    const asia = regionStations('East Asia').slice(0, 3);
    const days = outlook(europe, asia, 10);
    const each = europe.flatMap((here) => asia.map((there) => outlook([here], [there], 10)));
    days.forEach(({ commonHours }, day) => {
      const sum = each.reduce((total, one) => total + one[day]!.commonHours, 0);
      expect(commonHours).toBeCloseTo(sum / 6, 9);
    });
  });

  it('counts two stations of one place, who see the same sky', () => {
    const neighbour = { ...pair[0], callSign: 'QC2FAR' };
    const hours = outlook([pair[0]], [neighbour], 5).map(({ commonHours }) => commonHours);
    expect(Math.min(...hours)).toBeGreaterThan(1);
  });

  it('does not count a place as its own partner within one region', () => {
    const places = regionStations('Oceania').slice(0, 2);
    const within = outlook(places, places, 10);
    const between = outlook([places[0]!], [places[1]!], 10);
    within.forEach(({ commonHours }, day) => {
      expect(commonHours).toBeCloseTo(between[day]!.commonHours, 9);
    });
  });
});

describe('the outlook’s question', () => {
  const nowMs = Date.UTC(2026, 11, 1, 14, 41);
  const parse = (query: string) => parseOutlookQuestion(new URLSearchParams(query), nowMs);

  it('begins today between two regions', () => {
    expect(parse('')).toEqual({
      question: {
        here: 'Europe',
        there: 'North America',
        band: '144',
        fromMs: Date.UTC(2026, 11, 1),
      },
      problems: [],
    });
  });

  it('reads ends, band and date', () => {
    expect(parse('here=QA1LUN&there= jo97ee &band=10368&from=2028-02-29').question).toEqual({
      here: 'QA1LUN',
      there: 'jo97ee',
      band: '10368',
      fromMs: Date.UTC(2028, 1, 29),
    });
  });

  it('says what it cannot read and keeps the rest', () => {
    const { question, problems } = parse('here=Africa&band=7&from=2027-02-29');
    expect(question).toMatchObject({ here: 'Africa', band: '144', fromMs: Date.UTC(2026, 11, 1) });
    expect(problems).toEqual([
      '“7” is not a band here. Choose one from the list.',
      '“2027-02-29” is not a date from 2000 to 2099. Write it as 2026-12-01.',
    ]);
  });

  it('knows regions in any letter case', () => {
    expect(regionNamed(' north  america')).toBe('North America');
    expect(regionNamed('Atlantis')).toBeNull();
    for (const region of REGIONS) {
      expect(regionStations(region)).toHaveLength(6);
      for (const { site } of regionStations(region)) {
        expect(Math.abs(site.latitudeDeg)).toBeLessThan(66);
        expect(Math.abs(site.longitudeDeg)).toBeLessThanOrEqual(180);
      }
    }
  });
});
