import type { MoonTable } from '../../domain/ephemeris';
import { LEAST_DISTANCE_KM, skyAndDegradation } from '../../domain/link';
import type { LayersCache } from '../../domain/window/layers';
import { questionSpan } from '../../domain/window/question';
import { bestFirst } from '../../domain/window/ranking';
import { whyWords } from '../../domain/window/sentences';
import type { Answer } from './answer';
import type { ListedWindow } from './BestFirst';

/** The windows of an answer, best first, each with its reasons and where the Moon stands at its best moment. */
export function listedWindows(
  { question, stations, taken, layers, degreesOf }: Answer,
  cache: LayersCache,
): ListedWindow[] {
  const table = cache.windows.table(questionSpan(question));
  const model = cache.model(question.band);
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

function geocentricKm(table: MoonTable, atMs: number): number {
  const moon = new Float64Array(3);
  table.moonEarthFixed(atMs, moon);
  return Math.hypot(moon[0]!, moon[1]!, moon[2]!);
}
