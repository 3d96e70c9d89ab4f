import type { MoonTable } from '../../domain/ephemeris';
import { LEAST_DISTANCE_KM, skyAndDegradation } from '../../domain/link';
import type { LinkMoment } from '../../domain/link/moment';
import type { LayersCache } from '../../domain/window/layers';
import { questionSpan } from '../../domain/window/question';
import { bestFirst } from '../../domain/window/ranking';
import { whyWords, type WhyFacts } from '../../domain/window/sentences';
import type { Answer } from './answer';
import type { ListedWindow } from './BestFirst';

/** The windows of an answer, best first, each with its reasons and where the Moon stands at its best moment. */
export function listedWindows(
  { question, stations, taken, layers, degreesOf }: Answer,
  cache: LayersCache,
): ListedWindow[] {
  const table = cache.windows.table(questionSpan(question));
  const model = cache.model(question.band);
  const [link] = layers.judge.links.length === 1 ? layers.judge.links : [];
  const moment = link?.over(table);
  return bestFirst(layers.windows, layers.windowQuality).map((index) => {
    const window = layers.windows[index]!;
    const atMs = window.best.timeMs;
    const km = geocentricKm(table, atMs);
    const { degradationDb } = skyAndDegradation(model, atMs);
    return {
      index,
      why: whyWords(window, {
        geocentricDistanceKm: km,
        skyLossDb: degradationDb - 40 * Math.log10(km / LEAST_DISTANCE_KM),
        ...(moment ? lossesAt(moment, atMs) : {}),
        taken,
        degreesOf,
      }),
      look: stations.slice(0, 2).map(({ site }) => {
        const { azimuthDeg, elevationDeg } = table.sample(site, atMs);
        return { azimuthDeg, elevationDeg };
      }),
    };
  });
}

/** What the weaker direction loses beside the path. */
function lossesAt(
  moment: LinkMoment,
  atMs: number,
): Pick<WhyFacts, 'polarizationLossDb' | 'spreadLossDb'> {
  moment.compute(atMs);
  const [there, back] = moment.directions;
  const { polarizationLossDb, spreadLossDb } = there.marginDb < back.marginDb ? there : back;
  // Below 500 MHz every hour carries the same 3 dB, which tells hours not apart.
  const known = moment.model.ways[0].meeting.kind === 'offset';
  return { polarizationLossDb: known ? polarizationLossDb : 0, spreadLossDb };
}

function geocentricKm(table: MoonTable, atMs: number): number {
  const moon = new Float64Array(3);
  table.moonEarthFixed(atMs, moon);
  return Math.hypot(moon[0]!, moon[1]!, moon[2]!);
}
