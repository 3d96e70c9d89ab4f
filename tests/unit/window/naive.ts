import fc from 'fast-check';
import { moonTrack, refracted, type MoonTable } from '../../../src/domain/ephemeris/index';
import type { Site, SkyLimits } from '../../../src/domain/sky/limits';
import type { Interval } from '../../../src/domain/time/interval';
import type { LimitReason, WindowStation } from '../../../src/domain/window/types';

type Look = (azimuthDeg: number, airlessDeg: number) => LimitReason | null;

/** The rules of a station's sky once more, in degrees and in the plainest words, to check the quick ones by. */
export function naiveSky(sky: SkyLimits, refraction = false): Look {
  const profile = sky.horizon?.length ? naiveProfile(sky.horizon) : null;
  const lowered = sky.horizon?.length
    ? sky.horizon.some((point) => point.elevationDeg < 0)
    : (sky.elevationFromDeg ?? 0) < 0;
  return (azimuthDeg, airlessDeg) => {
    const el = refraction ? refracted(airlessDeg) : airlessDeg;
    if (!lowered && el < 0) return 'horizon';
    if (profile && el < profile(azimuthDeg)) return 'horizonProfile';
    if (sky.elevationFromDeg !== undefined && el < sky.elevationFromDeg) return 'elevationLimit';
    if (sky.elevationToDeg !== undefined && el > sky.elevationToDeg) return 'elevationLimit';
    if (sky.transmitElevationFromDeg !== undefined && el < sky.transmitElevationFromDeg) {
      return 'transmitElevation';
    }
    if (sky.azimuthFromDeg !== undefined && sky.azimuthToDeg !== undefined) {
      if (!clockwise(sky.azimuthFromDeg, azimuthDeg, sky.azimuthToDeg)) return 'azimuthLimit';
    }
    for (const sector of sky.blocked ?? []) {
      const across = clockwise(sector.azimuthFromDeg, azimuthDeg, sector.azimuthToDeg);
      if (across && el >= sector.elevationFromDeg && el <= sector.elevationToDeg) {
        return 'blockedSector';
      }
    }
    return null;
  };
}

function clockwise(fromDeg: number, azimuthDeg: number, toDeg: number): boolean {
  let to = toDeg;
  while (to <= fromDeg) to += 360;
  let az = azimuthDeg;
  while (az < fromDeg) az += 360;
  return az <= to;
}

function naiveProfile(points: NonNullable<SkyLimits['horizon']>): (azimuthDeg: number) => number {
  const sorted = [...points].sort((a, b) => a.azimuthDeg - b.azimuthDeg);
  const around = [-360, 0, 360].flatMap((turn) =>
    sorted.map((point) => ({ ...point, azimuthDeg: point.azimuthDeg + turn })),
  );
  return (azimuthDeg) => {
    const after = around.findIndex((point) => point.azimuthDeg > azimuthDeg);
    const a = around[after - 1]!;
    const b = around[after]!;
    const share = (azimuthDeg - a.azimuthDeg) / (b.azimuthDeg - a.azimuthDeg);
    return a.elevationDeg + share * (b.elevationDeg - a.elevationDeg);
  };
}

export function naiveReasonAt(
  table: MoonTable,
  station: WindowStation,
  timeMs: number,
  refraction = false,
): LimitReason | null {
  const instant = { startMs: timeMs, endMs: timeMs };
  const point = moonTrack(table, station.site, instant, 1)[0]!;
  return naiveSky(station.sky, refraction)(point.azimuthDeg, point.elevationDeg);
}

export const HALF_MINUTE_MS = 30_000;

/** Whether every station is free, every 30 s of the span. */
export function bruteForce(
  table: MoonTable,
  stations: readonly WindowStation[],
  span: Interval,
  refraction = false,
): { timeMs: number; free: boolean }[] {
  const skies = stations.map(({ sky }) => naiveSky(sky, refraction));
  const tracks = stations.map(({ site }) => moonTrack(table, site, span, HALF_MINUTE_MS));
  return tracks[0]!.map(({ timeMs }, index) => ({
    timeMs,
    free: skies.every((look, station) => {
      const { azimuthDeg, elevationDeg } = tracks[station]![index]!;
      return look(azimuthDeg, elevationDeg) === null;
    }),
  }));
}

const figure = (min: number, max: number) =>
  fc.double({ min, max, noNaN: true }).map((value) => Math.round(value * 100) / 100);

const maybe = <T>(value: fc.Arbitrary<T>) => fc.option(value, { nil: undefined });

const blocked = fc
  .record({
    from: figure(0, 359.9),
    width: figure(0.1, 120),
    low: figure(0, 60),
    high: figure(0.5, 50),
  })
  .map(({ from, width, low, high }) => ({
    azimuthFromDeg: from,
    azimuthToDeg: (from + width) % 360,
    elevationFromDeg: low,
    elevationToDeg: Math.min(90, low + high),
  }));

const hills = (lowest: number, highest: number, most: number) =>
  fc.uniqueArray(
    fc.record({ azimuthDeg: figure(0, 359.9), elevationDeg: figure(lowest, highest) }),
    { minLength: 1, maxLength: most, selector: (point) => point.azimuthDeg, size: 'max' },
  );

/** Skies with every kind of limit at once. */
const crowded: fc.Arbitrary<SkyLimits> = fc
  .record({
    elevationFromDeg: maybe(figure(-1, 12)),
    room: maybe(figure(25, 80)),
    azimuth: maybe(fc.tuple(figure(0, 359.9), figure(150, 350))),
    blocked: maybe(fc.array(blocked, { minLength: 1, maxLength: 3 })),
    horizon: maybe(hills(-1, 12, 24)),
    transmitElevationFromDeg: maybe(figure(0, 14)),
  })
  .map(({ room, azimuth, elevationFromDeg, ...sky }) => ({
    ...sky,
    elevationFromDeg,
    elevationToDeg: room === undefined ? undefined : Math.min(90, (elevationFromDeg ?? 0) + room),
    azimuthFromDeg: azimuth?.[0],
    azimuthToDeg: azimuth ? (azimuth[0] + azimuth[1]) % 360 : undefined,
  }));

/** Skies of masts, gaps and corners, where windows of minutes hide. */
const rugged: fc.Arbitrary<SkyLimits> = fc.oneof(
  fc.record({ horizon: hills(-1, 60, 60) }),
  fc.record({ blocked: fc.array(blocked, { minLength: 4, maxLength: 12, size: 'max' }) }),
  fc
    .tuple(figure(0, 359.9), figure(1, 60), figure(0, 40), figure(1, 20))
    .map(([from, width, low, high]) => ({
      azimuthFromDeg: from,
      azimuthToDeg: (from + width) % 360,
      elevationFromDeg: low,
      elevationToDeg: low + high,
    })),
);

export const skyArbitrary: fc.Arbitrary<SkyLimits> = fc.oneof(crowded, rugged);

export const siteArbitrary: fc.Arbitrary<Site> = fc.record({
  latitudeDeg: fc.oneof(
    { weight: 6, arbitrary: figure(-65, 65) },
    { weight: 1, arbitrary: fc.constantFrom(90, -90, 89.9, 0, 71, -78, 28.5, -18.3) },
  ),
  longitudeDeg: figure(-180, 180),
  heightM: fc.integer({ min: 0, max: 4000 }),
});

export function stationArbitrary(callSign: string): fc.Arbitrary<WindowStation> {
  return fc.record({ callSign: fc.constant(callSign), site: siteArbitrary, sky: skyArbitrary });
}

/** Two stations no further apart than a continent, so that they often share the Moon. */
export const pairArbitrary: fc.Arbitrary<[WindowStation, WindowStation]> = fc
  .tuple(stationArbitrary('QA1LUN'), stationArbitrary('QB2MOO'), figure(-25, 25), figure(-50, 50))
  .map(([first, second, north, east]) => {
    const latitudeDeg = Math.max(-90, Math.min(90, first.site.latitudeDeg + north));
    const longitudeDeg = ((first.site.longitudeDeg + east + 540) % 360) - 180;
    return [first, { ...second, site: { ...second.site, latitudeDeg, longitudeDeg } }];
  });

const HOUR_MS = 3_600_000;

/** Two to four days somewhere from 2026 to 2035. */
export const spanArbitrary: fc.Arbitrary<Interval> = fc
  .tuple(fc.integer({ min: 0, max: 3560 * 24 }), fc.integer({ min: 40, max: 96 }))
  .map(([hour, hours]) => {
    const startMs = Date.UTC(2026, 0, 1) + hour * HOUR_MS + 12_345;
    return { startMs, endMs: startMs + hours * HOUR_MS };
  });
