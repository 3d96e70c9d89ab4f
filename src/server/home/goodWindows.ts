import { DAY_MS, HOUR_MS, type Interval } from '../../domain/time/interval';
import { expandUsableHours } from '../../domain/time/weeklyHours';
import { degradationModel, LEAST_DISTANCE_KM, skyAndDegradation } from '../../domain/link';
import { moonSampleDirect } from '../../domain/ephemeris';
import { bandById, type BandId } from '../../domain/station/bands';
import type { ModeId } from '../../domain/station/modes';
import { findCommonWindows, WindowCache } from '../../domain/window';
import { judgedCurve, judgeOf } from '../../domain/window/judge';
import { QUALITY_STEPS, type Quality } from '../../domain/window/quality';
import { bestMoment } from '../../domain/window/qualityBands';
import { whyWords } from '../../domain/window/sentences';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { judgedParties } from '../skeds/judgedParties';
import { partyStation, type PartyStation } from '../skeds/load';

export interface GoodWindow extends Interval {
  ownId: string;
  partnerId: string;
  callSign: string;
  band: BandId;
  quality: Quality;
  why: string;
}

interface Partner {
  station: PartyStation;
  /** Of the latest sked. */
  band: BandId;
  mode: ModeId;
}

const DAYS = 7;
const MOST_PARTNERS = 6;
const MOST = 8;

/**
 * The best windows of the coming week between the viewer's station and those it has had skeds with lately, when both are
 * awake: at most eight, in order of time. Judged by the margin in the mode of the latest sked with the partner where both have
 * equipment, else by degradation.
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
  const found: GoodWindow[] = [];
  for (const { station, band, mode } of partners) {
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
    const judged = await judgedParties(services.db, [own, station], band);
    const curve = judgedCurve(judgeOf(judged, frequencyMhz, mode), cache.table(span));
    for (const window of windows) {
      const { timeMs: bestMs, quality } = bestMoment(curve, window);
      if (quality.step === 'below') continue;
      const { geocentricDistanceKm } = moonSampleDirect(own.site, bestMs);
      const distanceLossDb = 40 * Math.log10(geocentricDistanceKm / LEAST_DISTANCE_KM);
      const degradationDb = skyAndDegradation(model, bestMs).degradationDb;
      found.push({
        startMs: window.startMs,
        endMs: window.endMs,
        ownId: own.id,
        partnerId: station.id,
        callSign: station.callSign,
        band,
        quality,
        why: whyWords(window, {
          geocentricDistanceKm,
          skyLossDb: degradationDb - distanceLossDb,
          taken: [],
        }),
      });
    }
  }
  return found
    .sort((a, b) => worth(b) - worth(a))
    .slice(0, MOST)
    .sort((a, b) => a.startMs - b.startMs);
}

/** Margins and degradations stand in one list, so the step counts; three hours of length weigh as much as one. */
function worth(window: GoodWindow): number {
  const hours = (window.endMs - window.startMs) / HOUR_MS;
  return QUALITY_STEPS.indexOf(window.quality.step) + Math.min(4, hours) / 3;
}

async function recentPartners({ db }: Services, viewer: Viewer, ownId: string): Promise<Partner[]> {
  const rows = await db
    .selectFrom('sked')
    .innerJoin('sked_party as own', 'own.sked_id', 'sked.id')
    .innerJoin('sked_party as other', 'other.sked_id', 'sked.id')
    .innerJoin('station', 'station.id', 'other.station_id')
    .selectAll('station')
    .select(['sked.band', 'sked.mode', 'sked.start_at'])
    .where('own.station_id', '=', ownId)
    .where('station.id', 'not in', (crew) =>
      crew.selectFrom('station_crew').select('station_id').where('person_id', '=', viewer.id),
    )
    .orderBy('sked.updated_at', 'desc')
    .limit(60)
    .execute();
  const seen = new Map<string, Partner>();
  for (const row of rows) {
    if (!seen.has(row.id)) {
      seen.set(row.id, { station: partyStation(row), band: row.band, mode: row.mode });
    }
  }
  return [...seen.values()].slice(0, MOST_PARTNERS);
}
