import type { Tx } from '../db/transaction';
import { Conflict } from '../errors';

/** Throws `Conflict` when the person is the only keeper of the station. */
export async function requireAnotherKeeper(
  tx: Tx,
  stationId: string,
  callSign: string,
  personId: string,
): Promise<void> {
  const other = await tx
    .selectFrom('station_crew')
    .select('person_id')
    .where('station_id', '=', stationId)
    .where('crew_role', '=', 'keeper')
    .where('person_id', '!=', personId)
    .executeTakeFirst();
  if (!other) {
    throw new Conflict(
      `${callSign} needs a keeper, and this is its last one. Make somebody else a keeper first.`,
    );
  }
}
