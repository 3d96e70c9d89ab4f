import type { BandId } from '../../domain/station/bands';
import type { JudgedStation } from '../../domain/window/judge';
import type { Db } from '../db/connection';
import { equipmentOf } from '../stations/records';
import type { PartyStation } from './load';

/** The stations at their exact places with their equipment on the band, for results that are computed here. */
export async function judgedParties(
  db: Db,
  stations: readonly PartyStation[],
  band: BandId,
): Promise<JudgedStation[]> {
  const equipment = await equipmentOf(
    db,
    stations.map((station) => station.id),
  );
  return stations.map(({ id, callSign, site }) => ({
    callSign,
    site,
    setup: equipment.get(id)?.find((one) => one.band === band)?.setup ?? null,
  }));
}
