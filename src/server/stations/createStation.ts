import type { NewStation } from '../../domain/station/schema';
import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { newId } from '../ids';
import type { Services } from '../services';
import { requireFreeCallSign } from './callSignTaken';
import type { Saved } from './changeStation';

/** Registers a station; the person becomes its keeper. Throws `Conflict` for a call sign that is taken. */
export async function createStation(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  input: NewStation,
): Promise<Saved & { id: string }> {
  const id = newId();
  const now = services.now();
  await inTransaction(services.db, async (tx) => {
    await requireFreeCallSign(tx, input.callSign);
    await tx
      .insertInto('station')
      .values({
        id,
        call_sign: input.callSign,
        name: input.name,
        latitude_deg: input.latitudeDeg,
        longitude_deg: input.longitudeDeg,
        height_m: input.heightM,
        locator: input.locator,
        public_locator_length: input.publicLocatorLength,
        time_zone: input.timeZone,
        sky_json: '{}',
        hours_json: JSON.stringify({ weekly: null, daysOff: [] }),
        created_at: now,
        updated_at: now,
      })
      .execute();
    await tx
      .insertInto('station_crew')
      .values({ station_id: id, person_id: viewer.id, crew_role: 'keeper', added_at: now })
      .execute();
  });
  return { id, version: 1 };
}
