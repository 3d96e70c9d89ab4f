import { z } from 'zod';
import { figure, record } from '../../domain/station/fields';
import { polarizationSchema } from '../../domain/station/equipmentSchema';
import type { Antenna, ReceiveStage } from '../../domain/station/setup';
import { DEFAULT_APERTURE_EFFICIENCY } from '../../domain/link/antenna';
import type { LinkReceive, LinkSetup } from '../../domain/link/setup';

const antennaSchema = z
  .union(
    [
      record({
        diameterM: figure('The diameter of the dish', 0.1, 100, 'm'),
        apertureEfficiency: figure('The efficiency of the dish', 0.05, 1).optional(),
      }),
      record({
        gainDbi: figure('The gain of the antenna', 0, 70, 'dBi'),
        beamwidthDeg: figure('The beamwidth', 0.01, 180, '°').optional(),
      }),
    ],
    'An antenna is { diameterM, apertureEfficiency? } or { gainDbi, beamwidthDeg? }, with sensible figures.',
  )
  .transform((antenna): Antenna => {
    if ('gainDbi' in antenna) return { kind: 'gain', ...antenna };
    const { diameterM, apertureEfficiency = DEFAULT_APERTURE_EFFICIENCY } = antenna;
    return { kind: 'dish', diameterM, apertureEfficiency };
  });

const stageSchema = z
  .union(
    [
      record({
        gainDb: figure('The gain of a stage', -20, 100, 'dB'),
        noiseFigureDb: figure('The noise figure of a stage', 0, 40, 'dB'),
      }),
      record({
        lossDb: figure('The loss of a stage', 0, 60, 'dB'),
        physicalTemperatureK: figure('The temperature of a stage', 4, 400, 'K').optional(),
      }),
    ],
    'A stage is { gainDb, noiseFigureDb } or { lossDb, physicalTemperatureK? }, with sensible figures.',
  )
  .transform((stage): ReceiveStage =>
    'gainDb' in stage ? { kind: 'amplifier', ...stage } : { kind: 'loss', ...stage },
  );

const spilloverK = figure('The noise from the ground', 0, 300, 'K').optional();

const receiveSchema = z
  .union(
    [
      record({ systemTemperatureK: figure('The system temperature', 3, 30_000, 'K') }),
      record({
        receiverTemperatureK: figure('The receiver temperature', 1, 30_000, 'K'),
        spilloverK,
      }),
      record({
        stages: z
          .array(stageSchema, 'The stages must be a list, feed first.')
          .min(1, 'Give at least one stage of the receive chain.')
          .max(20, 'At most 20 stages can be given.'),
        spilloverK,
      }),
    ],
    'A receiver is { systemTemperatureK }, { receiverTemperatureK, spilloverK? } or { stages, spilloverK? }, with sensible figures.',
  )
  .transform((receive): LinkReceive => {
    if ('systemTemperatureK' in receive) return { kind: 'measured', ...receive };
    if ('stages' in receive) return { kind: 'stages', ...receive };
    return { kind: 'receiver', ...receive };
  });

/** A station's equipment as the open calculators take it. */
export const setupSchema = record(
  {
    antenna: antennaSchema,
    polarization: polarizationSchema,
    powerAtFeedW: figure('The power at the feed', 0.001, 10_000, 'W'),
    receive: receiveSchema,
    pointingErrorDeg: figure('The pointing error', 0, 90, '°').optional(),
  },
  'A setup',
).transform((setup): LinkSetup => setup);
