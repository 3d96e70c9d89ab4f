import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { nearestSlots } from '~/domain/sked/nearestSlots';
import { obstacleSentence, slotObstacle, type SkedStation } from '~/domain/sked/obstacle';
import { moonSampleDirect } from '~/domain/ephemeris';
import { findCommonWindows } from '~/domain/window';
import { DAY_MS, HOUR_MS, MINUTE_MS, unionIntervals } from '~/domain/time/interval';

const NOW = Date.UTC(2027, 0, 18);
const lun: SkedStation = {
  callSign: 'QA1LUN',
  site: { latitudeDeg: 57.19, longitudeDeg: 18.38, heightM: 20 },
  sky: { elevationFromDeg: 8 },
};
const tid: SkedStation = {
  callSign: 'QB7TID',
  site: { latitudeDeg: 42.1, longitudeDeg: -76.3, heightM: 300 },
  sky: {},
};

describe('obstacle in a slot', () => {
  const { windows } = findCommonWindows({
    startMs: NOW,
    endMs: NOW + 20 * DAY_MS,
    stations: [lun, tid],
    minimumMinutes: 90,
  });

  it('agrees with the window search about every edge', () => {
    expect(windows.length).toBeGreaterThan(5);
    for (const window of windows.slice(1, -1)) {
      const inside = {
        startMs: Math.ceil(window.startMs / MINUTE_MS) * MINUTE_MS,
        endMs: Math.floor(window.endMs / MINUTE_MS) * MINUTE_MS,
      };
      expect(slotObstacle([lun, tid], inside)).toBeNull();
      const early = { startMs: inside.startMs - 20 * MINUTE_MS, endMs: inside.startMs + HOUR_MS };
      const opening = slotObstacle([lun, tid], early)!;
      expect(opening.callSign).toBe(window.opens.callSign);
      expect(opening.reason).toBe(window.opens.reason);
      expect(opening.untilMs).toBe(inside.startMs);
      const late = { startMs: inside.endMs - HOUR_MS, endMs: inside.endMs + 20 * MINUTE_MS };
      const closing = slotObstacle([lun, tid], late)!;
      expect(closing.reason).toBe(window.closes.reason);
      expect(closing.fromMs).toBe(inside.endMs + MINUTE_MS);
    }
  });

  it('says in words what hides the Moon, until when or from when', () => {
    const startMs = Math.ceil(windows[0]!.startMs / MINUTE_MS) * MINUTE_MS + 30 * MINUTE_MS;
    const { azimuthDeg } = moonSampleDirect(lun.site, startMs);
    const barn: SkedStation = {
      ...lun,
      sky: {
        blocked: [
          {
            azimuthFromDeg: azimuthDeg - 30,
            azimuthToDeg: azimuthDeg + 1,
            elevationFromDeg: 0,
            elevationToDeg: 90,
            name: 'barn',
          },
        ],
      },
    };
    const slot = { startMs, endMs: startMs + 30 * MINUTE_MS };
    const behind = slotObstacle([barn, tid], slot)!;
    expect(obstacleSentence(behind, slot)).toMatch(
      /^The Moon is behind QA1LUN’s barn until \d\d:\d\d UTC\.$/,
    );
    const barnAhead: SkedStation = {
      ...lun,
      sky: {
        blocked: [
          {
            azimuthFromDeg: azimuthDeg + 1,
            azimuthToDeg: azimuthDeg + 30,
            elevationFromDeg: 0,
            elevationToDeg: 90,
          },
        ],
      },
    };
    expect(obstacleSentence(slotObstacle([barnAhead, tid], slot)!, slot)).toMatch(
      /^The Moon goes behind a blocked sector of QA1LUN at \d\d:\d\d UTC\.$/,
    );
    let downMs = startMs;
    while (moonSampleDirect(lun.site, downMs).elevationDeg > -5) downMs += 10 * MINUTE_MS;
    const setting = { startMs: downMs, endMs: downMs + HOUR_MS };
    expect(obstacleSentence(slotObstacle([lun], setting)!, setting)).toMatch(
      /^The Moon is below QA1LUN’s horizon\. QA1LUN can use it from (\w+ \d+ \w+ )?\d\d:\d\d UTC\.$/,
    );
    const never: SkedStation = { ...tid, sky: { elevationFromDeg: 88 } };
    expect(obstacleSentence(slotObstacle([lun, never], slot)!, slot)).toBe(
      'The Moon is outside the elevations QB7TID’s dish can reach, and stays out of reach for two days.',
    );
  });
});

describe('nearest slots', () => {
  it('offers the nearest first, on fives where possible', () => {
    const free = [
      { startMs: 2 * MINUTE_MS, endMs: 50 * MINUTE_MS },
      { startMs: 101 * MINUTE_MS, endMs: 119 * MINUTE_MS },
      { startMs: 303 * MINUTE_MS, endMs: 400 * MINUTE_MS },
    ];
    const wished = { startMs: 120 * MINUTE_MS, endMs: 136 * MINUTE_MS };
    expect(nearestSlots(free, wished, 3).map((slot) => slot.startMs / MINUTE_MS)).toEqual([
      103, 30, 305,
    ]);
  });

  it('gives whole-minute slots of the wished length inside the free time, for any input', () => {
    const stretch = fc.tuple(fc.integer({ min: 0, max: 9e8 }), fc.integer({ min: 1, max: 9e7 }));
    fc.assert(
      fc.property(
        fc.array(stretch, { maxLength: 12 }),
        fc.integer({ min: 0, max: 15_000 }),
        fc.integer({ min: 10, max: 1440 }),
        (stretches, start, minutes) => {
          const free = unionIntervals(
            stretches.map(([startMs, lengthMs]) => ({ startMs, endMs: startMs + lengthMs })),
          );
          const startMs = start * MINUTE_MS;
          const wished = { startMs, endMs: startMs + minutes * MINUTE_MS };
          const slots = nearestSlots(free, wished, 3);
          for (const slot of slots) {
            expect(slot.startMs % MINUTE_MS).toBe(0);
            expect(slot.endMs - slot.startMs).toBe(minutes * MINUTE_MS);
            expect(free.some((one) => one.startMs <= slot.startMs && slot.endMs <= one.endMs)).toBe(
              true,
            );
          }
          const room = free.filter(
            (one) =>
              Math.floor((one.endMs - minutes * MINUTE_MS) / MINUTE_MS) >=
              Math.ceil(one.startMs / MINUTE_MS),
          );
          expect(slots).toHaveLength(Math.min(3, room.length));
        },
      ),
      { numRuns: 500, seed: 7 },
    );
  });
});
