import { describe, expect, it } from 'vitest';
import {
  formatDoppler,
  formatDuration,
  formatHoursMinutes,
  formatLocal,
  formatLocalRange,
  formatNumber,
  formatPosition,
  formatSigned,
  formatUtc,
  formatUtcRange,
  isTimeZone,
  zoneName,
} from '../../../src/domain/time/format';

const utc = (text: string) => Date.parse(`${text}Z`);

describe('instants for people', () => {
  const range = { startMs: utc('2027-01-20T22:00'), endMs: utc('2027-01-20T22:45') };

  it('UTC first', () => {
    expect(formatUtc(range.startMs)).toBe('Wed 20 Jan 22:00 UTC');
    expect(formatUtcRange(range)).toBe('Wed 20 Jan 22:00–22:45 UTC');
    expect(formatUtcRange({ ...range, endMs: utc('2027-01-21T00:30') }, { withYear: true })).toBe(
      'Wed 20 Jan 2027 22:00 – Thu 21 Jan 2027 00:30 UTC',
    );
  });

  it('local with the zone named', () => {
    expect(formatLocal(range.startMs, 'Europe/Berlin')).toBe('CET 23:00');
    expect(formatLocal(range.startMs, 'America/New_York')).toBe('EST 17:00');
    expect(formatLocal(range.startMs, 'Australia/Adelaide')).toBe('ACDT Thu 08:30');
    expect(formatLocalRange(range, 'Asia/Kathmandu')).toBe('Thu 21 Jan 03:45–04:30 UTC+5:45');
    expect(
      formatLocalRange(
        { startMs: utc('2027-03-28T00:30'), endMs: utc('2027-03-28T01:30') },
        'Europe/Berlin',
      ),
    ).toBe('Sun 28 Mar 01:30 CET – Sun 28 Mar 03:30 CEST');
  });

  it('zone names', () => {
    expect(zoneName(range.startMs, 'UTC')).toBe('UTC');
    expect(zoneName(range.startMs, 'America/Sao_Paulo')).toBe('UTC−3');
    expect(zoneName(utc('2027-07-01T00:00'), 'Europe/Berlin')).toBe('CEST');
    expect(isTimeZone('Europe/Berlin')).toBe(true);
    expect(isTimeZone('Europe/Atlantis')).toBe(false);
    expect(isTimeZone('')).toBe(false);
  });
});

describe('figures for people', () => {
  it('durations', () => {
    const minutes = (n: number) => formatDuration(n * 60_000);
    expect(minutes(30)).toBe('30 min');
    expect(minutes(105)).toBe('1 h 45 min');
    expect(minutes(65)).toBe('1 h 05 min');
    expect(minutes(180)).toBe('3 h');
    expect(minutes(51 * 60)).toBe('2 d 3 h');
    expect(minutes(1440)).toBe('1 d');
    expect(minutes(1439.6)).toBe('1 d');
    expect(formatHoursMinutes(7.666667 * 3_600_000)).toBe('7:40');
  });

  it('numbers', () => {
    expect(formatNumber(-12.34, 1)).toBe('−12.3');
    expect(formatNumber(-0.04, 1)).toBe('0.0');
    expect(formatNumber(373587)).toBe('373\u00a0587');
    expect(formatNumber(NaN)).toBe('–');
    expect(formatSigned(6.14)).toBe('+6.1');
    expect(formatSigned(0.04)).toBe('0.0');
    expect(formatDoppler(2713, 1296)).toBe('+2\u00a0713\u00a0Hz');
    expect(formatDoppler(-5436, 10368)).toBe('−5\u00a0440\u00a0Hz');
    expect(formatPosition({ latitudeDeg: -57.19, longitudeDeg: 18.384 })).toBe(
      '57.19° S, 18.38° E',
    );
  });
});
