import type { z } from 'zod';
import { decideOffer, type Decision, type Sked } from '../../domain/sked/machine';
import { bandById, type BandId } from '../../domain/station/bands';
import type { Viewer } from '../auth/viewer';
import type { SkedRow } from '../db/tables';
import { inTransaction, type Tx } from '../db/transaction';
import { Forbidden, InvalidInput, NotFound } from '../errors';
import { stationForGuest } from '../guests/guestStation';
import { newId } from '../ids';
import type { Services } from '../services';
import { withAlternatives } from './alternatives';
import { partyStation, stationIdsOf, type PartyStation } from './load';
import { notifyDecision } from './notify';
import { refusalError, SlotTaken } from './refusals';
import { saveHappenings } from './save';
import type { skedOfferSchema } from './schemas';
import { requireMoon, slotWarnings } from './slotCheck';

export interface OfferOutcome {
  id: string;
  version: number;
  warnings: string[];
}

/**
 * Offers a sked from one of the viewer's stations to one or more others. Own agreed skeds in that time and hours
 * in which somebody sleeps are told as warnings. Throws `InvalidInput`, `Forbidden` for a station that is not
 * the viewer's, `NotFound` for a partner that is not listed, `Conflict` with alternatives when the Moon is not there.
 */
export async function offerSked(
  services: Services,
  viewer: Viewer,
  input: z.output<typeof skedOfferSchema>,
): Promise<OfferOutcome> {
  const slot = { startMs: input.start, endMs: input.end };
  const frequencyMhz = frequencyIn(input);
  let stations: PartyStation[] = [];
  try {
    return await inTransaction(services.db, async (tx) => {
      const parties = await partiesOf(tx, services, viewer, input);
      stations = parties.stations;
      const nowMs = services.now();
      const decision = decideOffer(
        {
          by: input.station,
          parties: stations.map(({ id, callSign }) => ({ stationId: id, callSign })),
          slot,
        },
        { nowMs },
      );
      if (!decision.ok) throw refusalError(decision.refusal);
      requireMoon(stations, slot);
      const id = newId();
      // Nothing is told of a partner without an account that the offerer did not enter.
      const known = stations.filter((station) => !parties.guestIds.has(station.id));
      const warnings = [
        ...(await slotWarnings(tx, known, slot, id)),
        ...(await equipmentWarnings(tx, known, input.band)),
      ];
      const row = await insertSked(tx, services, id, decision.sked, {
        band: input.band,
        frequency_mhz: frequencyMhz,
        mode: input.mode,
        at: nowMs,
      });
      const by = { personId: viewer.id, words: input.words, atMs: nowMs };
      await saveHappenings(tx, id, decision, by);
      await notifyDecision(tx, services, {
        loaded: { row, sked: decision.sked, stations },
        decision: decision satisfies Decision,
        by: input.station,
        actor: viewer,
        words: input.words,
      });
      return { id, version: decision.sked.version, warnings };
    });
  } catch (error) {
    if (!(error instanceof SlotTaken)) throw error;
    throw await withAlternatives(services, error, stations, slot);
  }
}

function frequencyIn(input: z.output<typeof skedOfferSchema>): number {
  const band = bandById(input.band);
  const frequencyMhz = input.frequencyMhz ?? band.centreMhz;
  if (frequencyMhz < band.fromMhz || frequencyMhz > band.toMhz) {
    const message = `The frequency must lie between ${band.fromMhz} and ${band.toMhz} MHz.`;
    throw new InvalidInput(message, [{ path: 'frequencyMhz', message }]);
  }
  return frequencyMhz;
}

interface Parties {
  stations: PartyStation[];
  /** Which of them were described with the offer. */
  guestIds: Set<string>;
}

/** The stations in the order given: registered ones, and people without an account as they are described. */
async function partiesOf(
  tx: Tx,
  services: Services,
  viewer: Viewer,
  input: z.output<typeof skedOfferSchema>,
): Promise<Parties> {
  const partners = input.with;
  const ids = partners.filter((partner) => typeof partner === 'string');
  const registered = await stationsFor(tx, viewer, [input.station, ...ids]);
  const stations = [registered[0]!];
  const guestIds = new Set<string>();
  for (const [index, partner] of partners.entries()) {
    if (typeof partner === 'string') {
      stations.push(registered.find((station) => station.id === partner)!);
      continue;
    }
    if (stations.some((station) => station.callSign === partner.callSign)) {
      const message = `${partner.callSign} takes part already. Each station counts once.`;
      throw new InvalidInput(message, [{ path: `with.${index}.callSign`, message }]);
    }
    const station = await stationForGuest(
      tx,
      services,
      viewer,
      partner,
      input.band,
      `with.${index}`,
    );
    stations.push(station);
    guestIds.add(station.id);
  }
  return { stations, guestIds };
}

/** The stations in the order given; the first must be the viewer's, the others listed or the viewer's too. */
async function stationsFor(tx: Tx, viewer: Viewer, ids: string[]): Promise<PartyStation[]> {
  const rows = await tx.selectFrom('station').selectAll().where('id', 'in', ids).execute();
  const mine = await stationIdsOf(tx, viewer.id);
  const byId = new Map(rows.map((row) => [row.id, partyStation(row)]));
  return ids.map((id, index) => {
    const station = byId.get(id);
    if (!station || !(station.listed || mine.has(id))) {
      throw new NotFound(
        index === 0 ? 'There is no such station.' : 'There is no such partner station.',
      );
    }
    if (index === 0 && !mine.has(id)) {
      throw new Forbidden(`You can offer only for a station to whose crew you belong.`);
    }
    return station;
  });
}

async function equipmentWarnings(
  tx: Tx,
  stations: PartyStation[],
  band: BandId,
): Promise<string[]> {
  const rows = await tx
    .selectFrom('station_band')
    .select('station_id')
    .where('band', '=', band)
    .where(
      'station_id',
      'in',
      stations.map((station) => station.id),
    )
    .execute();
  const equipped = new Set(rows.map((row) => row.station_id));
  return stations
    .filter((station) => !equipped.has(station.id))
    .map((station) => `${station.callSign} has entered no equipment for this band.`);
}

async function insertSked(
  tx: Tx,
  services: Services,
  id: string,
  sked: Sked,
  about: Pick<SkedRow, 'band' | 'frequency_mhz' | 'mode'> & { at: number },
) {
  const row = await tx
    .insertInto('sked')
    .values({
      id,
      uid: `${id}@${new URL(services.config.publicUrl).hostname}`,
      sequence: sked.sequence,
      band: about.band,
      frequency_mhz: about.frequency_mhz,
      mode: about.mode,
      state: sked.state,
      version: sked.version,
      offered_by: sked.offeredBy,
      start_at: sked.startMs,
      end_at: sked.endMs,
      created_at: about.at,
      updated_at: about.at,
    })
    .returningAll()
    .executeTakeFirstOrThrow();
  await tx
    .insertInto('sked_party')
    .values(
      sked.parties.map((party, place) => ({
        sked_id: id,
        station_id: party.stationId,
        place,
        answer: party.answer,
      })),
    )
    .execute();
  return row;
}
