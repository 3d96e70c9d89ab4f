import { z } from 'zod';
import { BAND_IDS } from './bands';
import { LEAST_SYSTEM_K, MOST_SYSTEM_K } from '../link/measuredNoise';
import { figure, record, words } from './fields';
import type { Antenna, BandSetup, ReceiveChain, ReceiveStage } from './setup';

const stageName = words('The name of a stage', 30).optional();

const kindError = (sentence: string) => ({ error: sentence });

export const antennaSchema: z.ZodType<Antenna> = z.discriminatedUnion(
  'kind',
  [
    record({
      kind: z.literal('dish'),
      diameterM: figure('The diameter of the dish', 0.1, 100, 'm'),
      apertureEfficiency: figure('The efficiency of the dish', 0.05, 1),
    }),
    record({
      kind: z.literal('gain'),
      gainDbi: figure('The gain of the antenna', 0, 70, 'dBi'),
      beamwidthDeg: figure('The beamwidth', 0.01, 180, '°').optional(),
    }),
  ],
  kindError('Say what the antenna is: a dish, or an antenna of known gain.'),
);

export const receiveStageSchema: z.ZodType<ReceiveStage> = z.discriminatedUnion(
  'kind',
  [
    record({
      kind: z.literal('amplifier'),
      name: stageName,
      gainDb: figure('The gain of a stage', -20, 100, 'dB'),
      noiseFigureDb: figure('The noise figure of a stage', 0, 40, 'dB'),
    }),
    record({
      kind: z.literal('loss'),
      name: stageName,
      lossDb: figure('The loss of a stage', 0, 60, 'dB'),
      physicalTemperatureK: figure('The temperature of a stage', 4, 400, 'K').optional(),
    }),
  ],
  kindError('Say what the stage is: an amplifier, or a loss.'),
);

export const MAX_RECEIVE_STAGES = 20;

export const receiveChainSchema: z.ZodType<ReceiveChain> = z.discriminatedUnion(
  'kind',
  [
    record({
      kind: z.literal('measured'),
      systemTemperatureK: figure('The system temperature', LEAST_SYSTEM_K, MOST_SYSTEM_K, 'K'),
      fromNewestRecord: z
        .literal(true, { error: 'To use the newest record say true, else leave it out.' })
        .optional(),
    }),
    record({
      kind: z.literal('stages'),
      stages: z
        .array(receiveStageSchema, { error: 'The stages must be a list, feed first.' })
        .min(1, 'Give at least one stage of the receive chain.')
        .max(MAX_RECEIVE_STAGES, `At most ${MAX_RECEIVE_STAGES} stages are kept.`),
      spilloverK: figure('The noise from the ground', 0, 300, 'K').optional(),
    }),
  ],
  kindError('Say how the receiver is known: a measured system temperature, or stage by stage.'),
);

export const polarizationSchema = z.enum(
  ['horizontal', 'vertical', 'rightCircular', 'leftCircular', 'rotatable'],
  {
    error: 'Polarisation must be horizontal, vertical, right or left circular, or rotatable.',
  },
);

export const bandSetupSchema: z.ZodType<BandSetup> = record(
  {
    antenna: antennaSchema,
    polarization: polarizationSchema,
    powerAtFeedW: figure('The power at the feed', 0.001, 10_000, 'W'),
    receive: receiveChainSchema,
  },
  'The equipment of a band',
);

/** Equipment by band, each band once. */
export const equipmentSchema = z
  .array(
    record({
      band: z.enum(BAND_IDS, { error: 'That is not a band on which moonbounce is worked.' }),
      setup: bandSetupSchema,
    }),
    { error: 'Equipment must be a list of bands.' },
  )
  .superRefine((bands, context) => {
    bands.forEach(({ band }, index) => {
      if (bands.findIndex((other) => other.band === band) < index) {
        context.addIssue({
          code: 'custom',
          path: [index, 'band'],
          message: `The band ${band} stands twice.`,
        });
      }
    });
  });
