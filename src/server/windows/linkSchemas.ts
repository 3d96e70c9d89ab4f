import { z } from 'zod';
import { DIAL_CONVENTIONS } from '../../domain/link/doppler';
import { LEDGER_EXPLANATIONS } from '../../domain/link/ledger';
import { MODE_FIGURES } from '../../domain/link/modes';
import { DEFAULT_SOLAR_FLUX_SFU } from '../../domain/link/sun';
import { figure, record } from '../../domain/station/fields';
import { callSignSchema, frequencySchema, instantSchema, modeSchema } from './calculatorSchemas';
import { setupSchema } from './setupSchema';
import { calculatorSkySchema, siteSchema } from './siteSchema';

/** For the OpenAPI document: every mode with its threshold and where that comes from. */
function modesText(): string {
  const rows = MODE_FIGURES.map(({ id, thresholdDb, resolutionHz, source }) => {
    const tones = resolutionHz === null ? '–' : `${resolutionHz.toFixed(2)} Hz`;
    return `| ${id} | ${thresholdDb.toFixed(1)} dB | ${tones} | ${source} |`;
  });
  return [
    'Threshold: signal-to-noise ratio in 2500 Hz.',
    '',
    '| Mode | Threshold | Tone spacing | Source |',
    '|---|---|---|---|',
    ...rows,
  ].join('\n');
}

const linkStationSchema = record(
  {
    callSign: callSignSchema.describe('Absent: A for the first, B for the second.').optional(),
    site: siteSchema,
    setup: setupSchema,
    sky: calculatorSkySchema
      .describe(
        'Taken so that a station can be sent as to a window search; it changes nothing here.',
      )
      .optional(),
  },
  'A station',
);

export const linkRequestSchema = record(
  {
    stations: z.tuple([linkStationSchema, linkStationSchema], {
      error: 'Give exactly two stations as a list.',
    }),
    frequencyMhz: frequencySchema,
    mode: modeSchema.describe(modesText()),
    time: instantSchema,
    solarFlux10cmSfu: figure('The solar flux at 10.7 cm', 1, 2000, 'SFU')
      .describe(`Absent: ${DEFAULT_SOLAR_FLUX_SFU}.`)
      .optional(),
    slotMinutes: figure('The length of the slot', 1, 1440, 'minutes')
      .describe('For the chance of a contact; absent: 30.')
      .optional(),
  },
  'The request',
).superRefine(({ stations: [first, second] }, context) => {
  const same = (first.callSign ?? 'A').toUpperCase() === (second.callSign ?? 'B').toUpperCase();
  if (!same) return;
  context.addIssue({
    code: 'custom',
    path: ['stations', 1, 'callSign'],
    message: 'Both stations have the same call sign.',
  });
});
export type LinkCalculatorRequest = z.output<typeof linkRequestSchema>;

const number = z.number();
const chance = number.min(0).max(1);
const dialShift = z.object({ transmitHz: number, receiveHz: number });

const termSchema = z.object({
  key: z.enum(Object.keys(LEDGER_EXPLANATIONS) as [string, ...string[]]),
  label: z.string(),
  value: number,
  level: number.describe('The sum up to and with this term.'),
});

const directionSchema = z.object({
  from: z.string(),
  to: z.string(),
  transmitGainDbi: number,
  receiveGainDbi: number,
  receivedPowerDbw: number,
  skyTemperatureK: number.describe('Behind the Moon, in the receiving antenna’s own beam.'),
  moonTemperatureK: number,
  sunTemperatureK: number,
  atmosphereTemperatureK: number.describe(
    'Not added to a measured system temperature, which has the air in it.',
  ),
  atmosphereLossDb: number.describe('Up and down.'),
  systemTemperatureK: number,
  polarizationLossDb: number.describe(
    'Linear feeds below 500 MHz: 3 dB, the mean over an unknown Faraday angle.',
  ),
  pointingLossDb: number.describe('Both antennas.'),
  beamFillLossDb: number.describe('Beams narrower than the Moon; 0 below 20 GHz.'),
  spreadLossDb: number.describe('Taken off the margin, not the signal-to-noise ratio.'),
  snrDb: number.describe('In 2500 Hz.'),
  thresholdDb: number,
  marginDb: number,
  chance: chance.describe('That this direction’s messages are read within the slot.'),
  ledger: z.object({
    signal: z.array(termSchema).describe('dB on a power in dBW, down to the margin.'),
    noise: z.array(termSchema).describe('K, up to the system temperature.'),
  }),
});

export const linkAnswerSchema = z.object({
  moonUp: z.boolean().describe('Above both geometric horizons; if not, every chance is 0.'),
  elevationsDeg: z.tuple([number, number]).describe('Airless, first and second station.'),
  pathLossDb: number,
  dopplerHz: number.describe('First to second station and back; linear in frequency.'),
  spreadHz: number.describe('Limb to limb.'),
  halfPowerSpreadHz: number.describe('Estimate, ±30 %.'),
  polarizationOffsetDeg: number.describe('0 … below 180.'),
  faradayOneWayDeg: z
    .object({ typical: number, least: number, most: number })
    .describe('Overhead, one passage.'),
  echoDelayS: number,
  dialShifts: z
    .object(
      Object.fromEntries(
        DIAL_CONVENTIONS.map((name) => [name, z.object({ first: dialShift, second: dialShift })]),
      ) as Record<
        (typeof DIAL_CONVENTIONS)[number],
        z.ZodObject<{ first: typeof dialShift; second: typeof dialShift }>
      >,
    )
    .describe('What to add to the agreed frequency, by convention.'),
  contactChance: chance.describe('Of the whole contact within the slot.'),
  slotMinutes: number,
  periods: number.describe('T/R periods of both stations together in the slot.'),
  directions: z.tuple([directionSchema, directionSchema]),
  notes: z.array(z.string()),
});
export type LinkAnswer = z.output<typeof linkAnswerSchema>;
