import { describe, expect, it } from 'vitest';
import type { z } from 'zod';
import { callSignSchema } from '../../../src/domain/station/callSign';
import { bandSetupSchema, equipmentSchema } from '../../../src/domain/station/equipmentSchema';
import { stationHoursSchema } from '../../../src/domain/station/hoursSchema';
import { MAX_BLOCKED_SECTORS, skyLimitsSchema } from '../../../src/domain/station/skySchema';

function problems(schema: z.ZodType, value: unknown): string[] {
  const parsed = schema.safeParse(value);
  return parsed.success
    ? []
    : parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`);
}

describe('call sign', () => {
  it.each(['QA1LUN', 'qb7tid', ' QK3OSL ', 'QA1LUN/P', 'Q4/QA1LUN', 'Q9ZZ', '2Q0ABC', 'QA100LUN'])(
    'takes %s',
    (text) => {
      expect(callSignSchema.parse(text)).toBe(text.trim().toUpperCase());
    },
  );
  it.each([
    ['', 'is needed'],
    ['QA', 'at least 3'],
    ['QA1LUNQA1LUNX', 'at most 12'],
    ['QA1 LUN', 'a space'],
    ['QA1🌙', '“🌙”'],
    ['QA1-LUN', '“-”'],
    ['QA1LUN//P', 'A slash stands'],
    ['/QA1LUN', 'A slash stands'],
    ['HELLO', 'such as QA1LUN'],
    ['12345', 'such as QA1LUN'],
  ])('refuses %s', (text, sentence) => {
    expect(problems(callSignSchema, text).join()).toContain(sentence);
  });
});

describe('sky', () => {
  it('takes an azimuth range through north, and all round', () => {
    expect(problems(skyLimitsSchema, { azimuthFromDeg: 350, azimuthToDeg: 10 })).toEqual([]);
    expect(problems(skyLimitsSchema, { azimuthFromDeg: 0, azimuthToDeg: 360 })).toEqual([]);
    expect(problems(skyLimitsSchema, {})).toEqual([]);
  });
  it.each([
    [{ azimuthFromDeg: 90, azimuthToDeg: 90 }, 'azimuthToDeg: Azimuth to points the same way'],
    [{ azimuthFromDeg: 360, azimuthToDeg: 0 }, 'points the same way'],
    [{ azimuthFromDeg: 90 }, 'azimuthToDeg: Give both ends'],
    [
      { azimuthFromDeg: 370, azimuthToDeg: 10 },
      'azimuthFromDeg: Azimuth from must be at most 360°.',
    ],
    [
      { elevationFromDeg: 60, elevationToDeg: 20 },
      'The highest elevation must be over the lowest.',
    ],
    [{ elevationToDeg: 20, transmitElevationFromDeg: 25 }, 'under the highest elevation'],
    [{ elevationFromDeg: '8' }, 'Lowest elevation must be a number.'],
    [{ elevationFromDeg: Infinity }, 'must be a number'],
    [{ height: 3 }, 'no field “height”'],
    [
      { blocked: [{ azimuthFromDeg: 5, azimuthToDeg: 5, elevationFromDeg: 0, elevationToDeg: 9 }] },
      'blocked.0.azimuthToDeg: Azimuth to points the same way',
    ],
    [
      { blocked: [{ azimuthFromDeg: 5, azimuthToDeg: 9, elevationFromDeg: 9, elevationToDeg: 9 }] },
      'blocked.0.elevationToDeg: Elevation to must be over',
    ],
    [
      {
        blocked: [
          {
            azimuthFromDeg: 5,
            azimuthToDeg: 9,
            elevationFromDeg: 0,
            elevationToDeg: 9,
            name: 'x'.repeat(41),
          },
        ],
      },
      'at most 40 characters',
    ],
    [
      {
        blocked: Array.from({ length: MAX_BLOCKED_SECTORS + 1 }, () => ({
          azimuthFromDeg: 5,
          azimuthToDeg: 9,
          elevationFromDeg: 0,
          elevationToDeg: 9,
        })),
      },
      'At most 50',
    ],
    [
      {
        horizon: [
          { azimuthDeg: 10, elevationDeg: 1 },
          { azimuthDeg: 10, elevationDeg: 2 },
        ],
      },
      'Point 2: azimuth 10 stands twice.',
    ],
    [
      {
        horizon: [
          { azimuthDeg: 20, elevationDeg: 1 },
          { azimuthDeg: 10, elevationDeg: 2 },
        ],
      },
      'Point 2: azimuth 10 comes after 20',
    ],
    [{ horizon: [{ azimuthDeg: 360, elevationDeg: 1 }] }, 'write it as 0'],
    [{ horizon: [{ azimuthDeg: 10, elevationDeg: 91 }] }, 'Elevation must be at most 90°.'],
  ])('refuses %j', (sky, sentence) => {
    expect(problems(skyLimitsSchema, sky).join(' | ')).toContain(sentence);
  });
});

const setup = {
  antenna: { kind: 'dish', diameterM: 3, apertureEfficiency: 0.55 },
  polarization: 'rightCircular',
  powerAtFeedW: 200,
  receive: { kind: 'stages', stages: [{ kind: 'amplifier', gainDb: 30, noiseFigureDb: 0.3 }] },
};

describe('equipment', () => {
  it('takes a dish with a chain', () => {
    expect(problems(bandSetupSchema, setup)).toEqual([]);
  });
  it.each([
    [{ powerAtFeedW: -5 }, 'powerAtFeedW: The power at the feed must be at least 0.001 W.'],
    [
      { antenna: { ...setup.antenna, apertureEfficiency: 1.2 } },
      'efficiency of the dish must be at most 1.',
    ],
    [{ antenna: { kind: 'rope' } }, 'Say what the antenna is'],
    [{ polarization: 'diagonal' }, 'Polarisation must be'],
    [{ receive: { kind: 'stages', stages: [] } }, 'at least one stage'],
    [{ receive: { kind: 'measured', systemTemperatureK: 0 } }, 'must be at least 3 K'],
    [
      { receive: { kind: 'stages', stages: [{ kind: 'loss', lossDb: -1 }] } },
      'receive.stages.0.lossDb: The loss of a stage must be at least 0 dB.',
    ],
  ])('refuses %j', (wrong, sentence) => {
    expect(problems(bandSetupSchema, { ...setup, ...wrong }).join(' | ')).toContain(sentence);
  });
  it('refuses a band twice and an unknown band', () => {
    const twice = [
      { band: '1296', setup },
      { band: '1296', setup },
    ];
    expect(problems(equipmentSchema, twice)).toEqual(['1.band: The band 1296 stands twice.']);
    expect(problems(equipmentSchema, [{ band: '1297', setup }]).join()).toContain('not a band');
  });
});

describe('hours', () => {
  it('sorts days off and keeps each once', () => {
    expect(
      stationHoursSchema.parse({
        weekly: null,
        daysOff: ['2027-02-13', '2027-01-01', '2027-02-13'],
      }),
    ).toEqual({ weekly: null, daysOff: ['2027-01-01', '2027-02-13'] });
  });
  it.each([
    [{ weekly: [{ weekday: 8, from: '08:00', to: '09:00' }], daysOff: [] }, 'from 1 (Monday)'],
    [{ weekly: [{ weekday: 1, from: '24:00', to: '09:00' }], daysOff: [] }, 'From must be a time'],
    [{ weekly: [{ weekday: 1, from: '8:00', to: '09:00' }], daysOff: [] }, 'From must be a time'],
    [{ weekly: [{ weekday: 1, from: '08:00', to: '24:01' }], daysOff: [] }, 'To must be a time'],
    [{ weekly: null, daysOff: ['2027-02-29'] }, 'a date that exists'],
    [{ daysOff: [] }, 'Weekly hours must be a list'],
  ])('refuses %j', (hours, sentence) => {
    expect(problems(stationHoursSchema, hours).join(' | ')).toContain(sentence);
  });
});
