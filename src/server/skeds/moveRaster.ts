import type { RasterMonth } from '../../domain/sked/rasterMonth';
import type { SkedView } from '../../domain/sked/view';
import { expandUsableHours } from '../../domain/time/weeklyHours';
import { LayersCache, windowLayers } from '../../domain/window/layers';
import { emptyQuestion, questionSpan } from '../../domain/window/question';
import type { ChosenStation } from '../../domain/window/searchData';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { equipmentOf } from '../stations/records';
import { takenSlots } from '../windows/takenSlots';
import type { PartyStation } from './load';

const DAYS = 28;

/**
 * The common windows of a sked's stations for four weeks as a raster shows them, with everybody's other skeds. Computed
 * here with the exact places; only the windows leave the server.
 */
export async function moveRaster(
  { db, now }: Services,
  viewer: Pick<Viewer, 'id'>,
  parties: readonly PartyStation[],
  sked: Pick<SkedView, 'band' | 'mode' | 'startMs' | 'endMs'>,
): Promise<RasterMonth> {
  const question = {
    ...emptyQuestion(now()),
    stations: parties.map(({ id }) => id),
    band: sked.band,
    mode: sked.mode,
    days: DAYS,
    lowestDeg: parties.map(() => null),
    minimumMinutes: Math.round((sked.endMs - sked.startMs) / 60_000),
  };
  const span = questionSpan(question);
  const equipment = await equipmentOf(db, question.stations);
  const stations = parties.map(
    ({ id, callSign, timeZone, locator, site, sky, hours }): ChosenStation => ({
      id,
      token: id,
      callSign,
      placeName: null,
      locator,
      timeZone,
      site,
      sky,
      usable: expandUsableHours(hours, span),
      equipment: equipment.get(id) ?? [],
      own: false,
    }),
  );
  const { windows, windowQuality, bands, outside, hidden, days, phases } = windowLayers(
    question,
    stations,
    new LayersCache(),
  );
  return {
    fromMs: question.fromMs,
    days: question.days,
    nowMs: now(),
    stations: stations.map(({ callSign, timeZone, usable }) => ({ callSign, timeZone, usable })),
    layers: { windows, windowQuality, bands, outside, hidden, days, phases },
    taken: await takenSlots(db, viewer, stations, span),
  };
}
