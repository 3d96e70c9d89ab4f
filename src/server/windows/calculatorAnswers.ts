import { z } from 'zod';

const instant = z.iso.datetime().describe('UTC, with Z.');
const number = z.number();

export const moonSampleSchema = z.object({
  time: instant,
  azimuthDeg: number.describe('From true north through east, 0 … below 360.'),
  elevationDeg: number.describe('Airless, centre of the disc.'),
  refractedElevationDeg: number,
  rangeKm: number.describe('Topocentric, geometric, to the centre of the Moon.'),
  rangeRateMps: number.describe('Receding positive.'),
  geocentricDistanceKm: number,
  rightAscensionDeg: number.describe('Geocentric, apparent, of date.'),
  declinationDeg: number.describe('Geocentric, apparent, of date.'),
  sunAzimuthDeg: number,
  sunElevationDeg: number,
  sunSeparationDeg: number.describe('As seen from the site.'),
  pathLossDb: number.describe('Own echo, isotropic to isotropic.').optional(),
  ownEchoDopplerHz: number.optional(),
  ownEchoSpreadHz: number.describe('Limb to limb.').optional(),
  skyTemperatureK: number
    .describe('Behind the Moon, in the reference beam of the band.')
    .optional(),
  degradationDb: number
    .describe('Against the least distance and the coldest sky of the path.')
    .optional(),
});

export const moonAnswerSchema = z.object({ samples: z.array(moonSampleSchema) });
export type MoonAnswer = z.output<typeof moonAnswerSchema>;

const reasonSchema = z.enum([
  'horizon',
  'elevationLimit',
  'transmitElevation',
  'azimuthLimit',
  'blockedSector',
  'horizonProfile',
  'degradation',
  'sunSeparation',
  'margin',
  'tooShort',
  'searchLimit',
]);

const causeSchema = z.object({
  callSign: z.string().nullable().describe('Null where the reason is no station’s own.'),
  reason: reasonSchema,
  name: z.string().describe('Name of the blocked sector, where it has one.').optional(),
});

const summarySchema = z.object({
  callSign: z.string(),
  startAzimuthDeg: number,
  startElevationDeg: number,
  endAzimuthDeg: number,
  endElevationDeg: number,
  maximumElevationDeg: number,
});

export const windowsAnswerSchema = z.object({
  windows: z.array(
    z.object({
      start: instant,
      end: instant,
      minutes: number,
      opens: causeSchema,
      closes: causeSchema,
      best: z
        .object({
          time: instant,
          degradationDb: number.optional(),
          marginDb: number
            .describe(
              'Least of all pairs and directions; given with frequencyMhz, mode and every setup.',
            )
            .optional(),
          chance: number
            .describe('Of a contact in a slot that begins then; the least of all pairs.')
            .optional(),
        })
        .describe(
          'The moment of least degradation where a frequency is given, else of the greatest lower elevation.',
        ),
      stations: z.array(summarySchema),
    }),
  ),
  lost: z
    .array(causeSchema.extend({ hours: number }))
    .describe(
      'Every hour of the search that is in no window, by the first limit that forbids it; in this order: horizon, horizonProfile, elevationLimit, transmitElevation, azimuthLimit, blockedSector, sunSeparation, degradation, margin, tooShort; within one reason the first call sign of the alphabet.',
    ),
});
export type WindowsAnswer = z.output<typeof windowsAnswerSchema>;

export const errorAnswerSchema = z
  .object({
    error: z.object({
      code: z.string(),
      message: z.string().describe('For a person.'),
      fields: z.array(z.object({ path: z.string(), message: z.string() })),
    }),
  })
  .meta({ id: 'Error' });
