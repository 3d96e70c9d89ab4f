import { z } from 'zod';
import type { NoiseFigures, NoiseMeasurement } from '../link/measuredNoise';
import { BAND_IDS, type BandId } from './bands';
import { figure, record, words } from './fields';

export type { FluxAt } from '../link/measuredNoise';
export type NoiseMethod = NoiseMeasurement['method'];

/** One measurement as kept, with what follows from it. */
export interface NoiseRecord {
  id: string;
  band: BandId;
  /** Day in UTC, "2027-01-18". */
  measuredOn: string;
  note: string;
  measurement: NoiseMeasurement;
  figures: NoiseFigures;
}

const common = {
  band: z.enum(BAND_IDS, { error: 'That is not a band on which moonbounce is worked.' }),
  measuredOn: z.iso
    .date({ error: 'Give the day of the measurement, such as 2027-01-18.' })
    .refine((day) => day >= '1950-01-01', 'The day must not lie before 1950.'),
  yDb: figure('The step', 0.01, 40, 'dB'),
  note: words('The note', 200).optional(),
};

/** What a keeper enters. For the Sun, gain and beam come from the station's equipment. */
export const noiseRecordSchema = z
  .discriminatedUnion(
    'method',
    [
      record({
        method: z.literal('hotCold'),
        ...common,
        hotK: figure('The temperature of the hot load', 4, 30_000, 'K'),
        coldK: figure('The temperature of the cold sky', 2.7, 3000, 'K'),
      }),
      record({
        method: z.literal('sun'),
        ...common,
        fluxSfu: figure('The flux of the Sun', 1, 100_000, 'SFU'),
        fluxAt: z.enum(['10cm', 'band'], {
          error: 'Say where the flux was measured: at 10.7 cm, or at the band itself.',
        }),
      }),
    ],
    { error: 'Say how it was measured: hot load and cold sky, or the Sun.' },
  )
  .superRefine((input, context) => {
    if (input.method === 'hotCold' && input.coldK >= input.hotK) {
      context.addIssue({
        code: 'custom',
        path: ['coldK'],
        message: 'The cold sky must be colder than the hot load.',
      });
    }
  });

export type NewNoiseRecord = z.output<typeof noiseRecordSchema>;

/** The record the budget takes for a band: the one measured last, of one day the one entered last. */
export function newestRecord(
  records: readonly NoiseRecord[],
  band: BandId,
): NoiseRecord | undefined {
  return records.find((candidate) => candidate.band === band);
}
