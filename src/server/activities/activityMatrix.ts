import { createHash } from 'node:crypto';
import { pairMatrix, type MatrixPair, type MatrixQuestion } from '../../domain/activity/matrix';
import type { BandId } from '../../domain/station/bands';
import type { Services } from '../services';
import { equipmentOf, skyOf } from '../stations/records';
import { loadRoster } from './loadRoster';
import { activityView, type ActivityRow } from './records';

const KEPT = 24;
/** By what went into them, the newest last. */
const kept = new Map<string, MatrixPair[]>();

/**
 * What every two stations that have not said no have in common on a band. Answers are kept by content: the same
 * stations, hours, equipment and dates are not computed again.
 */
export async function activityMatrix(
  services: Services,
  row: ActivityRow,
  band: BandId,
): Promise<MatrixPair[]> {
  const question = await matrixQuestion(services, row, band);
  if (!question) return [];
  const key = createHash('sha256').update(JSON.stringify(question)).digest('base64url');
  const pairs = kept.get(key) ?? pairMatrix(question);
  kept.delete(key);
  kept.set(key, pairs);
  if (kept.size > KEPT) kept.delete(kept.keys().next().value!);
  return pairs;
}

async function matrixQuestion(
  { db, now }: Services,
  row: ActivityRow,
  band: BandId,
): Promise<MatrixQuestion | null> {
  const activity = await activityView(db, row, now());
  const chosen = activity.bands.find((one) => one.band === band);
  if (!chosen) return null;
  const { stations, rows } = await loadRoster(db, row);
  const there = stations.filter(
    (station) => station.answer !== 'notComing' && station.bands.includes(band),
  );
  const equipment = await equipmentOf(
    db,
    there.map(({ stationId }) => stationId),
  );
  return {
    startMs: row.start_at,
    endMs: row.end_at,
    frequencyMhz: chosen.frequencyMhz,
    mode: chosen.mode,
    slotMinutes: row.slot_minutes,
    stations: there.map(({ stationId, callSign, usable }) => {
      const station = rows.get(stationId)!;
      const own = equipment.get(stationId)?.find((one) => one.band === band);
      return {
        id: stationId,
        callSign,
        site: {
          latitudeDeg: station.latitude_deg,
          longitudeDeg: station.longitude_deg,
          heightM: station.height_m,
        },
        sky: skyOf(station),
        usable,
        setup: own?.setup ?? null,
      };
    }),
  };
}
