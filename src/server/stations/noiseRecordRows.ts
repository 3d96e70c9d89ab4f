import { noiseFigures, type NoiseMeasurement } from '../../domain/link/measuredNoise';
import { bandById } from '../../domain/station/bands';
import { newestRecord, type NoiseRecord } from '../../domain/station/noiseRecord';
import type { BandEquipment } from '../../domain/station/views';
import type { Db } from '../db/connection';
import type { NoiseRecordRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { InvalidInput } from '../errors';

/** Noise records of one station, newest first. */
export async function noiseRecordsOf(db: Db | Tx, stationId: string): Promise<NoiseRecord[]> {
  const rows = await db
    .selectFrom('noise_record')
    .selectAll()
    .where('station_id', '=', stationId)
    .orderBy('measured_on', 'desc')
    .orderBy('created_at', 'desc')
    .orderBy('id')
    .execute();
  return rows.map(noiseRecordOf);
}

export function noiseRecordOf(row: NoiseRecordRow): NoiseRecord {
  const measurement = measurementOf(row);
  return {
    id: row.id,
    band: row.band,
    measuredOn: row.measured_on,
    note: row.note,
    measurement,
    figures: noiseFigures(measurement, bandById(row.band).centreMhz),
  };
}

/** The schema of the table makes sure that what a method needs is there. */
function measurementOf(row: NoiseRecordRow): NoiseMeasurement {
  return row.method === 'hotCold'
    ? { method: 'hotCold', yDb: row.y_db, hotK: row.hot_k!, coldK: row.cold_k! }
    : {
        method: 'sun',
        yDb: row.y_db,
        fluxSfu: row.flux_sfu!,
        fluxAt: row.flux_at!,
        gainDbi: row.gain_dbi!,
        beamwidthDeg: row.beamwidth_deg!,
      };
}

/** Puts the newest record's temperature where the equipment says so; without a record what was saved stays. */
export async function fillFromNewestRecords(
  db: Db | Tx,
  byStation: ReadonlyMap<string, BandEquipment[]>,
): Promise<void> {
  for (const [stationId, equipment] of byStation) {
    if (!equipment.some(usesNewestRecord)) continue;
    const records = await noiseRecordsOf(db, stationId);
    for (const { band, setup } of equipment.filter(usesNewestRecord)) {
      const newest = newestRecord(records, band);
      if (newest) setup.receive = fromRecord(newest);
    }
  }
}

/** Equipment as it is saved: temperatures from the newest records. Throws `InvalidInput` where there is none. */
export async function withNewestRecords(
  tx: Tx,
  stationId: string,
  equipment: BandEquipment[],
): Promise<BandEquipment[]> {
  if (!equipment.some(usesNewestRecord)) return equipment;
  const records = await noiseRecordsOf(tx, stationId);
  return equipment.map((entry, index) => {
    if (!usesNewestRecord(entry)) return entry;
    const newest = newestRecord(records, entry.band);
    if (newest) return { ...entry, setup: { ...entry.setup, receive: fromRecord(newest) } };
    const message = `There is no noise record for ${bandById(entry.band).label} to take the system temperature from.`;
    throw new InvalidInput(message, [{ path: `equipment.${index}.setup.receive.kind`, message }]);
  });
}

export function usesNewestRecord({ setup: { receive } }: BandEquipment): boolean {
  return receive.kind === 'measured' && receive.fromNewestRecord === true;
}

function fromRecord({ figures }: NoiseRecord) {
  const { systemTemperatureK } = figures;
  return { kind: 'measured', systemTemperatureK, fromNewestRecord: true } as const;
}
