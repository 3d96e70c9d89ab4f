import { describe, expect, it } from 'vitest';
import {
  bandNumber,
  edgesPath,
  instantAt,
  placeOf,
  rasterFrame,
  rectanglesPath,
  rowPieces,
  rowTop,
} from '~/components/chart/rasterGeometry';
import { axisNotes, rasterAxes } from '~/components/chart/rasterView';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '~/domain/time/interval';

const FROM_MS = Date.parse('2027-01-18T00:00:00Z');
/** 24 px an hour. */
const frame = rasterFrame(FROM_MS, 30, 100 + 576 + 108, 3);
const at = (day: number, hour: number) => FROM_MS + day * DAY_MS + hour * HOUR_MS;

describe('rows of a raster', () => {
  it('cut intervals at midnight and drop what lies outside', () => {
    const pieces = rowPieces(frame, [
      { startMs: at(-1, 20), endMs: at(0, 2) },
      { startMs: at(3, 23), endMs: at(5, 1) },
      { startMs: at(29, 22), endMs: at(30, 5) },
      { startMs: at(31, 1), endMs: at(31, 2) },
    ]);
    expect(pieces.map(({ row, x, width }) => [row, x, width])).toEqual([
      [0, 100, 48],
      [3, 100 + 23 * 24, 24],
      [4, 100, 576],
      [5, 100, 24],
      [29, 100 + 22 * 24, 48],
    ]);
  });

  it('give every instant a place and every place its instant', () => {
    for (const [day, hour] of [
      [0, 0],
      [12, 13.5],
      [29, 23.99],
    ] as const) {
      const place = placeOf(frame, at(day, hour))!;
      expect(place.row).toBe(day);
      const back = instantAt(frame, place.x, rowTop(frame, place.row) + 5)!;
      expect(Math.abs(back - at(day, hour))).toBeLessThan(1);
    }
    expect(placeOf(frame, at(30, 0))).toBeNull();
    expect(placeOf(frame, FROM_MS - 1)).toBeNull();
    expect(instantAt(frame, 50, rowTop(frame, 3))).toBeNull();
    expect(instantAt(frame, 200, frame.top - 1)).toBeNull();
  });

  it('are lower for two months than for one', () => {
    expect(rasterFrame(FROM_MS, 60, 784, 3).rowHeight).toBeLessThan(frame.rowHeight);
  });

  it('draw rectangles and edges, but no edge at the ends of a day', () => {
    const pieces = rowPieces(frame, [{ startMs: at(0, 22), endMs: at(1, 2) }]);
    const top = rowTop(frame, 0);
    expect(rectanglesPath(frame, pieces, 4, 13)).toBe(
      `M628 ${top + 4}h48v13h-48zM100 ${top + 26}h48v13h-48z`,
    );
    expect(edgesPath(frame, pieces, 0, 11)).toBe(`M628 ${top}v11M148 ${top + 22}v11`);
  });
});

describe('the figure of a window', () => {
  const piece = (from: number, to: number) =>
    rowPieces(frame, [{ startMs: at(5, from), endMs: at(5, to) }]);
  const x = (hour: number) => 100 + hour * 24;

  it('stands at the best moment, moved inside at the ends', () => {
    expect(bandNumber(frame, piece(10, 14), at(5, 12), [])).toEqual({
      x: x(12),
      row: 5,
      place: 'inside',
    });
    expect(bandNumber(frame, piece(10, 14), at(5, 14), [])!.x).toBe(x(14) - 17);
  });

  it('stands beside a band too short for it, where the row is free', () => {
    const short = piece(10, 10.5);
    expect(bandNumber(frame, short, at(5, 10), short)).toMatchObject({
      place: 'beside',
      x: x(10.5) + 18,
    });
    const busy = [...short, ...piece(10.6, 12)];
    expect(bandNumber(frame, short, at(5, 10), busy)!.x).toBe(x(10) - 18);
    const crowded = [...busy, ...piece(8, 9.9)];
    expect(bandNumber(frame, short, at(5, 10), crowded)).toBeNull();
  });

  it('keeps off what is drawn over the band', () => {
    const slot = { startMs: at(5, 11), endMs: at(5, 13) };
    const moved = bandNumber(frame, piece(8, 14), at(5, 12), [], [slot])!;
    expect(moved.x).toBeLessThan(x(11));
    expect(bandNumber(frame, piece(11, 13), at(5, 12), [], [slot])).toBeNull();
  });
});

describe('axes', () => {
  const station = (callSign: string, timeZone: string | null) => ({ callSign, timeZone });

  it('show UTC and the clocks of two stations', () => {
    const axes = rasterAxes(
      [station('QA1LUN', 'Europe/Stockholm'), station('QB7TID', 'America/New_York')],
      FROM_MS,
    );
    expect(axes.map((axis) => axis.label)).toEqual(['UTC', 'QA1LUN CET', 'QB7TID EST']);
    expect(axes[1]!.hours.slice(0, 3)).toEqual(['01', '03', '05']);
    expect(axes[2]!.hours.at(-1)).toBe('19');
  });

  it('show minutes where a zone has them, and none for a place without a zone', () => {
    const axes = rasterAxes(
      [station('QT2ZEP', 'Asia/Kathmandu'), station('JO97ee', null)],
      FROM_MS,
    );
    expect(axes).toHaveLength(2);
    expect(axes[1]!.hours[0]).toBe('05:45');
  });

  it('tell of a change of clocks within the days', () => {
    const march = Date.parse('2027-03-10T00:00:00Z');
    const notes = axisNotes(
      [station('QA1LUN', 'Europe/Stockholm'), station('QB7TID', 'America/New_York')],
      march,
      30,
    );
    expect(notes).toEqual([
      'QA1LUN’s clock goes forward an hour on 28 Mar; its axis is true before that.',
      'QB7TID’s clock goes forward an hour on 14 Mar; its axis is true before that.',
    ]);
    expect(axisNotes([station('QA1LUN', 'Europe/Stockholm')], FROM_MS, 30)).toEqual([]);
    const kept = axisNotes(
      [station('QE9KAR', 'Australia/Lord_Howe')],
      Date.parse('2027-04-01'),
      10,
    );
    expect(kept[0]).toContain('back 30 minutes');
  });

  it('name the stations whose clocks have no axis', () => {
    const many = ['UTC', 'Europe/London', 'Asia/Tokyo'].map((zone, index) =>
      station(`QA${index}LUN`, zone),
    );
    expect(axisNotes(many, FROM_MS, 7).at(-1)).toContain('those of QA2LUN');
  });
});

it('minutes fit the figure width used above', () => {
  expect(placeOf(frame, FROM_MS + 30 * MINUTE_MS)!.x).toBe(112);
});
