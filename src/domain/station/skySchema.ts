import { z } from 'zod';
import type { BlockedSector, HorizonPoint, SkyLimits } from '../sky/limits';
import { figure, record, words } from './fields';

export const MAX_BLOCKED_SECTORS = 50;
export const MAX_HORIZON_POINTS = 720;
export const MAX_SECTOR_NAME = 40;

const azimuth = (what: string) => figure(what, 0, 360, '°');
const elevation = (what: string) => figure(what, -90, 90, '°');

/** Whether the range has no width. From 0 to 360 is the full circle. */
function withoutWidth(fromDeg: number, toDeg: number): boolean {
  return fromDeg % 360 === toDeg % 360 && !(fromDeg === 0 && toDeg === 360);
}

export const blockedSectorSchema: z.ZodType<BlockedSector> = record(
  {
    azimuthFromDeg: azimuth('Azimuth from'),
    azimuthToDeg: azimuth('Azimuth to'),
    elevationFromDeg: elevation('Elevation from'),
    elevationToDeg: elevation('Elevation to'),
    name: words('The name of a blocked sector', MAX_SECTOR_NAME).optional(),
  },
  'A blocked sector',
).superRefine((sector, context) => {
  if (withoutWidth(sector.azimuthFromDeg, sector.azimuthToDeg)) {
    context.addIssue({
      code: 'custom',
      path: ['azimuthToDeg'],
      message: 'Azimuth to points the same way as azimuth from, so the sector has no width.',
    });
  }
  if (sector.elevationToDeg <= sector.elevationFromDeg) {
    context.addIssue({
      code: 'custom',
      path: ['elevationToDeg'],
      message: 'Elevation to must be over elevation from.',
    });
  }
});

export const horizonPointSchema: z.ZodType<HorizonPoint> = record(
  { azimuthDeg: azimuth('Azimuth'), elevationDeg: elevation('Elevation') },
  'A horizon point',
);

/** Points must come by rising azimuth, each azimuth once; 360 is 0 and stands first as 0. */
export const horizonSchema: z.ZodType<HorizonPoint[]> = z
  .array(horizonPointSchema, { error: 'The horizon must be a list of points.' })
  .max(MAX_HORIZON_POINTS, `A horizon profile has at most ${MAX_HORIZON_POINTS} points.`)
  .superRefine((points, context) => {
    points.forEach((point, index) => {
      const before = points[index - 1];
      if (point.azimuthDeg === 360) {
        context.addIssue({
          code: 'custom',
          path: [index, 'azimuthDeg'],
          message: `Point ${index + 1}: azimuth 360 is north; write it as 0 and put it first.`,
        });
      } else if (before && point.azimuthDeg <= before.azimuthDeg) {
        const same = point.azimuthDeg === before.azimuthDeg;
        context.addIssue({
          code: 'custom',
          path: [index, 'azimuthDeg'],
          message: same
            ? `Point ${index + 1}: azimuth ${point.azimuthDeg} stands twice.`
            : `Point ${index + 1}: azimuth ${point.azimuthDeg} comes after ${before.azimuthDeg}; sort the points by azimuth.`,
        });
      }
    });
  });

/** What a dish can see; see `SkyLimits`. Absent limits do not limit. */
export const skyLimitsSchema: z.ZodType<SkyLimits> = record(
  {
    elevationFromDeg: elevation('Lowest elevation').optional(),
    elevationToDeg: elevation('Highest elevation').optional(),
    azimuthFromDeg: azimuth('Azimuth from').optional(),
    azimuthToDeg: azimuth('Azimuth to').optional(),
    blocked: z
      .array(blockedSectorSchema, { error: 'Blocked sectors must be a list.' })
      .max(MAX_BLOCKED_SECTORS, `At most ${MAX_BLOCKED_SECTORS} blocked sectors are kept.`)
      .optional(),
    horizon: horizonSchema.optional(),
    transmitElevationFromDeg: elevation('Lowest elevation for transmitting').optional(),
  },
  'The sky',
).superRefine((sky, context) => {
  const problem = (field: keyof SkyLimits, message: string) =>
    context.addIssue({ code: 'custom', path: [field], message });
  if ((sky.azimuthFromDeg === undefined) !== (sky.azimuthToDeg === undefined)) {
    problem(
      sky.azimuthFromDeg === undefined ? 'azimuthFromDeg' : 'azimuthToDeg',
      'Give both ends of the azimuth range, or neither for all round.',
    );
  } else if (
    sky.azimuthFromDeg !== undefined &&
    sky.azimuthToDeg !== undefined &&
    withoutWidth(sky.azimuthFromDeg, sky.azimuthToDeg)
  ) {
    problem(
      'azimuthToDeg',
      'Azimuth to points the same way as azimuth from. Leave both out for all round.',
    );
  }
  const highestDeg = sky.elevationToDeg ?? 90;
  if (sky.elevationFromDeg !== undefined && sky.elevationFromDeg >= highestDeg) {
    problem(
      sky.elevationToDeg === undefined ? 'elevationFromDeg' : 'elevationToDeg',
      'The highest elevation must be over the lowest.',
    );
  }
  if (sky.transmitElevationFromDeg !== undefined && sky.transmitElevationFromDeg >= highestDeg) {
    problem(
      'transmitElevationFromDeg',
      'The lowest elevation for transmitting must be under the highest elevation of the dish.',
    );
  }
});
