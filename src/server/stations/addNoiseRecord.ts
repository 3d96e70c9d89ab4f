import { antennaFigures } from '../../domain/link/antenna';
import { LinkInputError } from '../../domain/link/inputError';
import {
  noiseFigures,
  systemOutOfRange,
  type NoiseMeasurement,
} from '../../domain/link/measuredNoise';
import { bandById } from '../../domain/station/bands';
import type { NewNoiseRecord, NoiseRecord } from '../../domain/station/noiseRecord';
import { HOUR_MS } from '../../domain/time/interval';
import type { Viewer } from '../auth/viewer';
import type { NoiseRecordRow } from '../db/tables';
import { inTransaction, type Tx } from '../db/transaction';
import { Conflict, InvalidInput } from '../errors';
import { newId } from '../ids';
import type { Services } from '../services';
import { requireKeeper } from './access';
import { noiseRecordOf } from './noiseRecordRows';
import { equipmentOf } from './records';

export const MAX_NOISE_RECORDS = 500;

/** Zones are at most this far ahead of UTC: there it may be tomorrow already. */
const FARTHEST_ZONE_MS = 14 * HOUR_MS;

/**
 * Keeps a measurement of a band's noise, for a keeper. Gain and beam of a Sun measurement are those of the equipment
 * as saved now. Throws `NotFound`, `Forbidden`, `Conflict` when too many are kept, and `InvalidInput` for a day to
 * come, a band without equipment, and a step that no receiver can have shown.
 */
export async function addNoiseRecord(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  input: NewNoiseRecord,
): Promise<NoiseRecord> {
  const now = services.now();
  return inTransaction(services.db, async (tx) => {
    const station = await requireKeeper(tx, viewer, stationId);
    if (input.measuredOn > new Date(now + FARTHEST_ZONE_MS).toISOString().slice(0, 10)) {
      throw invalid('measuredOn', 'The day of the measurement is still to come.');
    }
    await requireRoom(tx, stationId);
    const measurement = await measurementFor(tx, station.call_sign, stationId, input);
    requireSense(measurement, bandById(input.band).centreMhz);
    const row: NoiseRecordRow = {
      id: newId(),
      station_id: stationId,
      band: input.band,
      measured_on: input.measuredOn,
      method: input.method,
      y_db: input.yDb,
      hot_k: measurement.method === 'hotCold' ? measurement.hotK : null,
      cold_k: measurement.method === 'hotCold' ? measurement.coldK : null,
      flux_sfu: measurement.method === 'sun' ? measurement.fluxSfu : null,
      flux_at: measurement.method === 'sun' ? measurement.fluxAt : null,
      gain_dbi: measurement.method === 'sun' ? measurement.gainDbi : null,
      beamwidth_deg: measurement.method === 'sun' ? measurement.beamwidthDeg : null,
      note: input.note ?? '',
      recorded_by: viewer.id,
      created_at: now,
    };
    await tx.insertInto('noise_record').values(row).execute();
    return noiseRecordOf(row);
  });
}

async function requireRoom(tx: Tx, stationId: string): Promise<void> {
  const { count } = await tx
    .selectFrom('noise_record')
    .select((eb) => eb.fn.countAll<number>().as('count'))
    .where('station_id', '=', stationId)
    .executeTakeFirstOrThrow();
  if (count < MAX_NOISE_RECORDS) return;
  throw new Conflict(
    `${MAX_NOISE_RECORDS} noise records are kept for a station. Remove one before you add another.`,
  );
}

async function measurementFor(
  tx: Tx,
  callSign: string,
  stationId: string,
  input: NewNoiseRecord,
): Promise<NoiseMeasurement> {
  const equipment = (await equipmentOf(tx, [stationId])).get(stationId) ?? [];
  const { label, centreMhz } = bandById(input.band);
  const setup = equipment.find(({ band }) => band === input.band)?.setup;
  if (!setup) {
    throw invalid('band', `${callSign} has no equipment on ${label} yet. Save it first.`);
  }
  const { yDb } = input;
  if (input.method === 'hotCold') {
    return { method: 'hotCold', yDb, hotK: input.hotK, coldK: input.coldK };
  }
  const { fluxSfu, fluxAt } = input;
  return { method: 'sun', yDb, fluxSfu, fluxAt, ...antennaFigures(setup.antenna, centreMhz) };
}

function requireSense(measurement: NoiseMeasurement, frequencyMhz: number): void {
  try {
    const sentence = systemOutOfRange(measurement, noiseFigures(measurement, frequencyMhz));
    if (sentence) throw invalid('yDb', sentence);
  } catch (error) {
    if (error instanceof LinkInputError) throw invalid(error.path, error.message);
    throw error;
  }
}

function invalid(path: string, message: string): InvalidInput {
  return new InvalidInput(message, [{ path, message }]);
}
