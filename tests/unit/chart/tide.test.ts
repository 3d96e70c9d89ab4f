import { describe, expect, it } from 'vitest';
import { compassWord } from '~/components/chart/compass';
import { within } from '~/components/chart/MoonDomes';
import { litPath } from '~/components/chart/MoonGlyph';
import {
  elevationAt,
  hourStep,
  tideArea,
  tideCurve,
  tideHours,
  tideInstant,
  tideX,
} from '~/components/chart/tideGeometry';
import { passAround } from '~/components/window/detailView';
import { HOUR_MS } from '~/domain/time/interval';

const START = Date.parse('2027-02-13T14:00:00Z');
const frame = { startMs: START, endMs: START + 10 * HOUR_MS, width: 530, left: 0, right: 500 };
const at = (hour: number) => START + hour * HOUR_MS;
const points = [-10, 0, 20, 40, 20, 0, -10].map((elevationDeg, index) => ({
  timeMs: at(index),
  elevationDeg,
}));

describe('the tide of elevations', () => {
  it('turns instants into places and back, held inside the frame', () => {
    expect(tideX(frame, at(3))).toBe(150);
    expect(tideInstant(frame, 150)).toBe(at(3));
    expect(tideInstant(frame, -50)).toBe(at(0));
    expect(tideInstant(frame, 900)).toBe(at(10));
  });

  it('draws straight lines between points and holds the ends', () => {
    expect(elevationAt(points, at(2.5))).toBeCloseTo(30);
    expect(elevationAt(points, at(-1))).toBe(-10);
    expect(elevationAt(points, at(9))).toBe(-10);
  });

  it('fills from the axis, up or down, never below the horizon', () => {
    const within2 = { startMs: at(2), endMs: at(3) };
    expect(tideArea(frame, points, within2, 100, -1, 1)).toBe('M100 100L100 80L150 60L150 100Z');
    expect(tideArea(frame, points, within2, 100, 1, 1)).toBe('M100 100L100 120L150 140L150 100Z');
    expect(tideArea(frame, points, { startMs: at(0), endMs: at(1) }, 100, -1, 1)).not.toContain(
      '110',
    );
    expect(tideArea(frame, points, { startMs: at(20), endMs: at(21) }, 100, -1, 1)).toBe('');
  });

  it('breaks the curve where the Moon is down', () => {
    const twice = [
      ...points,
      { timeMs: at(7), elevationDeg: 5 },
      { timeMs: at(8), elevationDeg: 9 },
    ];
    expect(tideCurve(frame, twice, 100, -1, 1).match(/M/g)).toHaveLength(2);
  });

  it('labels hours counted from midnight, as many as there is room for', () => {
    expect(hourStep(frame)).toBe(1);
    expect(hourStep({ ...frame, right: 200 })).toBe(3);
    expect(tideHours(frame, 4).map((hour) => new Date(hour).getUTCHours())).toEqual([16, 20, 0]);
  });
});

describe('the pass over a dome', () => {
  const track = points.map((point, index) => ({ ...point, azimuthDeg: (350 + index * 5) % 360 }));

  it('is the one that holds the window', () => {
    const set = [...track, { timeMs: at(7), elevationDeg: 3, azimuthDeg: 30 }];
    expect(passAround(set, at(3)).map((point) => point.timeMs)).toEqual([1, 2, 3, 4, 5].map(at));
  });

  it('is cut to a band with both ends put in, across north too', () => {
    const cut = within(track, at(1.5), at(3.5));
    expect(cut.map((point) => point.timeMs)).toEqual([at(1.5), at(2), at(3), at(3.5)]);
    expect(cut[0]!.azimuthDeg).toBeCloseTo(357.5);
    expect(cut[0]!.elevationDeg).toBeCloseTo(10);
  });

  it('has names for the winds', () => {
    expect([0, 22, 23, 180, 226, 340, 359].map(compassWord)).toEqual([
      'north',
      'north',
      'north-east',
      'south',
      'south-west',
      'north',
      'north',
    ]);
  });
});

describe('the disc of the Moon', () => {
  /** Sweep flags: the limb (1 right, 0 left) and the terminator. */
  const flags = (illuminated: number, waxing: boolean) =>
    [...litPath({ illuminated, waxing }, 0, 0, 10).matchAll(/ 0 0 ([01]) /g)].map(
      (match) => match[1],
    );

  it('is bright on the right while waxing, on the left while waning', () => {
    expect(flags(0.2, true)).toEqual(['1', '0']);
    expect(flags(0.8, true)).toEqual(['1', '1']);
    expect(flags(0.8, false)).toEqual(['0', '0']);
    expect(flags(0.2, false)).toEqual(['0', '1']);
  });
});
