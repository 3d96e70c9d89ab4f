import { DAY_MS, HOUR_MS, type Interval } from '../../domain/time/interval';
import { expandUsableHours } from '../../domain/time/weeklyHours';
import { degradationModel, LEAST_DISTANCE_KM, skyAndDegradation } from '../../domain/link';
import { moonSampleDirect } from '../../domain/ephemeris';
import { bandById, type BandId } from '../../domain/station/bands';
import { findCommonWindows, WindowCache } from '../../domain/window';
import { qualityOfDegradation, type Quality } from '../../domain/window/quality';
import { whyWords } from '../../domain/window/sentences';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { partyStation, type PartyStation } from '../skeds/load';

export interface GoodWindow extends Interval {
  ownId: string;
  partnerId: string;
  callSign: string;
  band: BandId;
  quality: Quality;
  why: string;
}

const DAYS = 7;
const MOST_PARTNERS = 6;
const MOST = 8;

/**
 * The best windows of the coming week between the viewer's station and those it has had skeds with lately, when both are
 * awake: at most eight, in order of time.
 */
export async function goodWindows(
  services: Services,
  viewer: Viewer,
  own: PartyStation,
): Promise<GoodWindow[]> {
  const partners = await recentPartners(services, viewer, own.id);
  const nowMs = services.now();
  const span = { startMs: nowMs, endMs: nowMs + DAYS * DAY_MS };
  const cache = new WindowCache();
  const found = partners.flatMap(({ station, band }) => {
    const frequencyMhz = bandById(band).centreMhz;
    const model = degradationModel(frequencyMhz);
    const { windows } = findCommonWindows(
      {
        ...span,
        frequencyMhz,
        minimumMinutes: 30,
        stations: [own, station].map(({ callSign, site, sky, hours }) => ({
          callSign,
          site,
          sky,
          usable: expandUsableHours(hours, span),
        })),
      },
      cache,
    );
    return windows.map((window) => {
      const bestMs = window.best.timeMs;
      const { geocentricDistanceKm } = moonSampleDirect(own.site, bestMs);
      const distanceLossDb = 40 * Math.log10(geocentricDistanceKm / LEAST_DISTANCE_KM);
      const degradationDb = skyAndDegradation(model, bestMs).degradationDb;
      return {
        startMs: window.startMs,
        endMs: window.endMs,
        ownId: own.id,
        partnerId: station.id,
        callSign: station.callSign,
        band,
        quality: qualityOfDegradation(degradationDb),
        why: whyWords(window, {
          geocentricDistanceKm,
          skyLossDb: degradationDb - distanceLossDb,
          taken: [],
        }),
      };
    });
  });
  return found
    .sort((a, b) => worth(b) - worth(a))
    .slice(0, MOST)
    .sort((a, b) => a.startMs - b.startMs);
}

/** Half a decibel an hour of length, up to four hours. */
function worth(window: GoodWindow): number {
  const hours = (window.endMs - window.startMs) / HOUR_MS;
  return window.quality.db + 0.5 * Math.min(4, hours);
}

async function recentPartners(
  { db }: Services,
  viewer: Viewer,
  ownId: string,
): Promise<{ station: PartyStation; band: BandId }[]> {
  const rows = await db
    .selectFrom('sked')
    .innerJoin('sked_party as own', 'own.sked_id', 'sked.id')
    .innerJoin('sked_party as other', 'other.sked_id', 'sked.id')
    .innerJoin('station', 'station.id', 'other.station_id')
    .selectAll('station')
    .select(['sked.band', 'sked.start_at'])
    .where('own.station_id', '=', ownId)
    .where('station.id', 'not in', (crew) =>
      crew.selectFrom('station_crew').select('station_id').where('person_id', '=', viewer.id),
    )
    .orderBy('sked.updated_at', 'desc')
    .limit(60)
    .execute();
  const seen = new Map<string, { station: PartyStation; band: BandId }>();
  for (const row of rows) {
    if (!seen.has(row.id)) seen.set(row.id, { station: partyStation(row), band: row.band });
  }
  return [...seen.values()].slice(0, MOST_PARTNERS);
}
