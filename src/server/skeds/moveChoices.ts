import type { MoveChoice } from '../../domain/sked/moveChoice';
import { nearestSlots } from '../../domain/sked/nearestSlots';
import { DAY_MS, MINUTE_MS, subtractIntervals, type Interval } from '../../domain/time/interval';
import { expandUsableHours } from '../../domain/time/weeklyHours';
import { findCommonWindows, WindowCache } from '../../domain/window';
import { judgedCurve, type Judge } from '../../domain/window/judge';
import { bestMoment } from '../../domain/window/qualityBands';
import type { Services } from '../services';
import type { PartyStation } from './load';
import { takenIntervals } from './takenIntervals';

const DAYS = 14;
const MOST = 12;

/**
 * Common windows of the next two weeks with room for a slot of that length while everybody is awake and nobody is
 * taken, soonest first; each with a slot of it around its best moment.
 */
export async function moveChoices(
  services: Services,
  stations: readonly PartyStation[],
  sked: Interval & { id: string; frequencyMhz: number },
  judge: Judge,
): Promise<MoveChoice[]> {
  const startMs = services.now() + 10 * MINUTE_MS;
  const span = { startMs, endMs: startMs + DAYS * DAY_MS };
  const lengthMs = sked.endMs - sked.startMs;
  const cache = new WindowCache();
  const search = {
    ...span,
    stations: stations.map(({ callSign, site, sky, hours }) => ({
      callSign,
      site,
      sky,
      usable: expandUsableHours(hours, span),
    })),
    frequencyMhz: sked.frequencyMhz,
    minimumMinutes: lengthMs / MINUTE_MS,
  };
  const { windows } = findCommonWindows(search, cache);
  const curve = judgedCurve(judge, cache.table(span));
  const ids = stations.map((station) => station.id);
  const taken = await takenIntervals(services.db, ids, span, sked.id);
  return windows
    .flatMap((window) => {
      const best = bestMoment(curve, window);
      const bestMs = best.timeMs - lengthMs / 2;
      const free = subtractIntervals([window], taken);
      const [slot] = nearestSlots(free, { startMs: bestMs, endMs: bestMs + lengthMs }, 1);
      if (!slot) return [];
      return [
        {
          window: { startMs: window.startMs, endMs: window.endMs },
          slot,
          quality: best.quality,
        },
      ];
    })
    .slice(0, MOST);
}
