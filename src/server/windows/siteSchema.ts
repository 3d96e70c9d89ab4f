import { z } from 'zod';
import { LocatorError, locatorToPosition } from '../../domain/locator/locator';
import type { HorizonPoint, Site, SkyLimits } from '../../domain/sky/limits';
import { figure, record } from '../../domain/station/fields';
import {
  MAX_BLOCKED_SECTORS,
  MAX_HORIZON_POINTS,
  blockedSectorSchema,
  horizonPointSchema,
} from '../../domain/station/skySchema';

type Issues = z.core.$RefinementCtx;

function problem(context: Issues, path: (string | number)[], message: string): void {
  context.addIssue({ code: 'custom', path, message });
}

/** A place by coordinates or by locator; the locator stands for the centre of its square. */
export const siteSchema = record(
  {
    latitudeDeg: figure('Latitude', -90, 90, '°').optional(),
    longitudeDeg: figure('Longitude', -180, 180, '°').describe('East positive.').optional(),
    locator: z
      .string('A locator must be text.')
      .max(10, 'A locator has 4, 6, 8 or 10 characters.')
      .describe('4, 6, 8 or 10 characters, instead of latitude and longitude.')
      .optional(),
    heightM: figure('Height', -450, 9000, 'm')
      .describe('Above the ellipsoid; absent: 0.')
      .optional(),
  },
  'A site',
).transform((site, context): Site => {
  const { latitudeDeg, longitudeDeg, locator, heightM = 0 } = site;
  const nowhere = { latitudeDeg: 0, longitudeDeg: 0, heightM };
  if (locator !== undefined) {
    if (latitudeDeg !== undefined || longitudeDeg !== undefined) {
      problem(context, [], 'Give either a locator or latitude and longitude, not both.');
      return nowhere;
    }
    try {
      const position = locatorToPosition(locator);
      return { latitudeDeg: position.latitudeDeg, longitudeDeg: position.longitudeDeg, heightM };
    } catch (error) {
      if (!(error instanceof LocatorError)) throw error;
      problem(context, ['locator'], error.message);
      return nowhere;
    }
  }
  if (latitudeDeg === undefined || longitudeDeg === undefined) {
    const missing = latitudeDeg === undefined ? 'latitudeDeg' : 'longitudeDeg';
    const neither = latitudeDeg === undefined && longitudeDeg === undefined;
    if (neither) problem(context, [], 'A site needs a locator, or latitude and longitude.');
    else problem(context, [missing], 'Latitude and longitude go together; one is missing.');
    return nowhere;
  }
  return { latitudeDeg, longitudeDeg, heightM };
});

const azimuth = (what: string) => figure(what, 0, 360, '°').optional();
const elevation = (what: string) => figure(what, -90, 90, '°').optional();

/** Points in any order; 360° is north like 0°. */
const horizonSchema = z
  .array(horizonPointSchema, 'The horizon must be a list of points.')
  .max(MAX_HORIZON_POINTS, `A horizon profile has at most ${MAX_HORIZON_POINTS} points.`)
  .superRefine((points, context) => {
    const known = new Map<number, number>();
    points.forEach(({ azimuthDeg, elevationDeg }, index) => {
      const there = known.get(azimuthDeg % 360);
      if (there !== undefined && there !== elevationDeg) {
        const message = `Azimuth ${azimuthDeg}° has two elevations, ${there}° and ${elevationDeg}°.`;
        problem(context, [index, 'azimuthDeg'], message);
      }
      known.set(azimuthDeg % 360, elevationDeg);
    });
  });

export const calculatorSkySchema = record(
  {
    elevationFromDeg: elevation('Lowest elevation'),
    elevationToDeg: elevation('Highest elevation'),
    azimuthFromDeg: azimuth('Azimuth from'),
    azimuthToDeg: azimuth('Azimuth to').describe(
      'Clockwise from azimuthFromDeg, through north too.',
    ),
    blocked: z
      .array(blockedSectorSchema, 'Blocked sectors must be a list.')
      .max(MAX_BLOCKED_SECTORS, `At most ${MAX_BLOCKED_SECTORS} blocked sectors can be given.`)
      .optional(),
    horizon: horizonSchema.describe('Linear between points, closed through north.').optional(),
    transmitElevationFromDeg: elevation('Lowest elevation for transmitting'),
  },
  'The sky',
)
  .superRefine((sky, context) => {
    checkAzimuths(sky, context);
    const highestDeg = sky.elevationToDeg ?? 90;
    if (sky.elevationFromDeg !== undefined && sky.elevationFromDeg >= highestDeg) {
      problem(context, ['elevationToDeg'], 'The highest elevation must be over the lowest.');
    }
    if (sky.transmitElevationFromDeg !== undefined && sky.transmitElevationFromDeg >= highestDeg) {
      const message =
        'The lowest elevation for transmitting must be under the highest elevation of the dish.';
      problem(context, ['transmitElevationFromDeg'], message);
    }
  })
  .transform((sky): SkyLimits => ({ ...sky, horizon: uniqueAzimuths(sky.horizon) }));

function checkAzimuths(
  sky: { azimuthFromDeg?: number | undefined; azimuthToDeg?: number | undefined },
  context: Issues,
): void {
  const { azimuthFromDeg: from, azimuthToDeg: to } = sky;
  if (from === undefined && to === undefined) return;
  if (from === undefined || to === undefined) {
    const missing = from === undefined ? 'azimuthFromDeg' : 'azimuthToDeg';
    problem(context, [missing], 'Give both ends of the azimuth range, or neither for all round.');
  } else if (from % 360 === to % 360 && !(from === 0 && to === 360)) {
    const message = 'Azimuth to points the same way as azimuth from. Leave both out for all round.';
    problem(context, ['azimuthToDeg'], message);
  }
}

function uniqueAzimuths(points: HorizonPoint[] | undefined): HorizonPoint[] | undefined {
  if (!points) return undefined;
  return [...new Map(points.map((point) => [point.azimuthDeg % 360, point])).values()];
}
