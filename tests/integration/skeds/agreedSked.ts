import type { Interval } from '../../../src/domain/time/interval';
import { inTransaction } from '../../../src/server/db/transaction';
import { newId } from '../../../src/server/ids';
import type { World } from './world';

/** An agreed sked at any time, written straight into the tables. Agreed at the world's present. */
export async function agreedSked(
  world: World,
  callSigns: readonly string[],
  slot: Interval,
): Promise<string> {
  const id = newId();
  const at = world.clock.nowMs;
  const stations = callSigns.map((callSign) => world.stationIds[callSign]!);
  await inTransaction(world.services.db, async (tx) => {
    await tx
      .insertInto('sked')
      .values({
        id,
        uid: `${id}@echotide.example`,
        sequence: 1,
        band: '1296',
        frequency_mhz: 1296.065,
        mode: 'q65-60c',
        state: 'agreed',
        version: 2,
        offered_by: stations[0]!,
        start_at: slot.startMs,
        end_at: slot.endMs,
        created_at: at,
        updated_at: at,
        agreed_version: 2,
      })
      .execute();
    for (const [place, station_id] of stations.entries()) {
      await tx
        .insertInto('sked_party')
        .values({ sked_id: id, station_id, place, answer: 'accepted' })
        .execute();
      await tx
        .insertInto('booking')
        .values({ sked_id: id, station_id, start_at: slot.startMs, end_at: slot.endMs })
        .execute();
    }
    await tx
      .insertInto('sked_event')
      .values({
        id: newId(),
        sked_id: id,
        sked_version: 2,
        kind: 'agreed',
        station_id: null,
        person_id: null,
        start_at: slot.startMs,
        end_at: slot.endMs,
        at,
      })
      .execute();
  });
  return id;
}
