import { describe, expect, it } from 'vitest';
import { refracted, unrefracted } from '../../../src/domain/ephemeris';
import {
  azimuthWidthDeg,
  azimuthWithin,
  compileSky,
  compiledSkyCause,
  skyCause,
  skyFree,
  type SkyLimits,
} from '../../../src/domain/sky';

const reason = (limits: SkyLimits, azimuthDeg: number, elevationDeg: number) =>
  skyCause(limits, azimuthDeg, elevationDeg)?.reason ?? null;

describe('what forbids a direction', () => {
  it('is the geometric horizon where the station says nothing', () => {
    expect(reason({}, 120, 0.001)).toBeNull();
    expect(reason({}, 120, -0.001)).toBe('horizon');
    expect(reason({ elevationFromDeg: 10 }, 120, -5)).toBe('horizon');
    expect(reason({ elevationFromDeg: 10 }, 120, 5)).toBe('elevationLimit');
  });

  it('is a lower limit where the station sees below 0°', () => {
    expect(reason({ elevationFromDeg: -2 }, 120, -1.9)).toBeNull();
    expect(reason({ elevationFromDeg: -2 }, 120, -2.1)).toBe('elevationLimit');
    const valley = [{ azimuthDeg: 0, elevationDeg: -1 }];
    expect(reason({ horizon: valley }, 120, -0.9)).toBeNull();
    expect(reason({ horizon: valley }, 120, -1.1)).toBe('horizonProfile');
  });

  it('is the profile between its points, and through north', () => {
    const horizon = [
      { azimuthDeg: 350, elevationDeg: 10 },
      { azimuthDeg: 30, elevationDeg: 2 },
      { azimuthDeg: 200, elevationDeg: 2 },
    ];
    expect(reason({ horizon }, 10, 5.9)).toBe('horizonProfile');
    expect(reason({ horizon }, 10, 6.1)).toBeNull();
    expect(reason({ horizon }, 0, 7.9)).toBe('horizonProfile');
    expect(reason({ horizon }, 0, 8.1)).toBeNull();
    expect(reason({ horizon }, 275, 5.9)).toBe('horizonProfile');
    expect(reason({ horizon }, 275, 6.1)).toBeNull();
    expect(reason({ horizon }, 275, -1)).toBe('horizon');
  });

  it('is an azimuth outside the range, through north too', () => {
    const north = { azimuthFromDeg: 300, azimuthToDeg: 40 };
    expect([299, 301, 0, 39, 41, 180].map((az) => reason(north, az, 20))).toEqual([
      'azimuthLimit',
      null,
      null,
      null,
      'azimuthLimit',
      'azimuthLimit',
    ]);
    const wide = { azimuthFromDeg: 40, azimuthToDeg: 300 };
    expect([39, 41, 180, 299, 301].map((az) => reason(wide, az, 20) === null)).toEqual([
      false,
      true,
      true,
      true,
      false,
    ]);
    expect(reason({ azimuthFromDeg: 0, azimuthToDeg: 360 }, 77, 20)).toBeNull();
  });

  it('is a blocked sector, by its name', () => {
    const barn = {
      azimuthFromDeg: 350,
      azimuthToDeg: 20,
      elevationFromDeg: 0,
      elevationToDeg: 25,
      name: 'barn',
    };
    expect(skyCause({ blocked: [barn] }, 5, 20)).toEqual({ reason: 'blockedSector', name: 'barn' });
    expect(skyCause({ blocked: [barn] }, 5, 26)).toBeNull();
    expect(skyCause({ blocked: [barn] }, 21, 20)).toBeNull();
  });

  it('is the lowest elevation for transmitting, and the highest of the dish', () => {
    const limits = { transmitElevationFromDeg: 12, elevationToDeg: 70, elevationFromDeg: 5 };
    expect(reason(limits, 90, 11)).toBe('transmitElevation');
    expect(reason(limits, 90, 71)).toBe('elevationLimit');
    expect(skyFree(limits, 90, 30)).toBe(true);
  });

  it('compares the apparent elevation where refraction is asked for', () => {
    const sky = compileSky({ elevationFromDeg: 10 }, true);
    const airless = unrefracted(10);
    expect(refracted(airless)).toBeCloseTo(10, 8);
    expect(airless).toBeLessThan(9.92);
    expect(compiledSkyCause(sky, 90, airless + 1e-4)).toBeNull();
    expect(compiledSkyCause(sky, 90, airless - 1e-4)?.reason).toBe('elevationLimit');
    expect(refracted(0)).toBeCloseTo(0.48, 2);
  });

  it('stays defined at the zenith', () => {
    expect(reason({ azimuthFromDeg: 10, azimuthToDeg: 300 }, 90, 90)).toBeNull();
  });
});

describe('azimuth ranges', () => {
  it('have a width and an inside', () => {
    expect(azimuthWidthDeg(350, 20)).toBe(30);
    expect(azimuthWidthDeg(20, 350)).toBe(330);
    expect(azimuthWidthDeg(0, 360)).toBe(360);
    expect(azimuthWithin(5, 350, 20)).toBe(true);
    expect(azimuthWithin(25, 350, 20)).toBe(false);
  });
});
