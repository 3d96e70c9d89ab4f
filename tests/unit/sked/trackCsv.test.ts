import { describe, expect, it } from 'vitest';
import { moonSampleDirect } from '~/domain/ephemeris';
import { trackCsv } from '~/domain/sked/trackCsv';
import { NORTH, SKED } from './stations';

describe('the track as CSV', () => {
  const csv = trackCsv(NORTH.site, SKED, 30, SKED.frequencyMhz);
  const lines = csv.split('\r\n');

  it('has a header with units, CRLF, and no empty field', () => {
    expect(lines[0]).toBe('utc,azimuth_deg,elevation_deg,own_echo_doppler_hz');
    expect(lines.at(-1)).toBe('');
    expect(csv.replaceAll('\r\n', '')).not.toMatch(/[\r\n]/);
    for (const line of lines.slice(1, -1)) {
      expect(line).toMatch(/^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\dZ,\d+\.\d,-?\d+\.\d,-?\d+$/);
    }
  });

  it('goes from the start to the end, both included', () => {
    expect(lines).toHaveLength(1 + 121 + 1);
    expect(lines[1]).toContain(new Date(SKED.startMs).toISOString().slice(0, 19));
    expect(lines.at(-2)).toContain(new Date(SKED.endMs).toISOString().slice(0, 19));
  });

  it('says where the Moon is', () => {
    const [, azimuth, elevation] = lines[41]!.split(',').map(Number);
    const exact = moonSampleDirect(NORTH.site, SKED.startMs + 40 * 30_000);
    expect(azimuth).toBeCloseTo(exact.azimuthDeg, 0.9);
    expect(Math.abs(elevation! - exact.elevationDeg)).toBeLessThan(0.051);
  });

  it('never reads 360.0 or −0.0', () => {
    const day = { startMs: SKED.startMs, endMs: SKED.startMs + 86_400_000 };
    const north = trackCsv({ latitudeDeg: -33, longitudeDeg: 10, heightM: 0 }, day, 10, 1296);
    expect(north).not.toMatch(/,360\.0,|,-0\.0,|,-0\r/);
  });
});
