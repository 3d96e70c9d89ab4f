import { buildMoonTable, type MoonTable } from '../ephemeris/table';
import { degradationModel, skyAndDegradation } from '../link/degradation';
import { createLinkEvaluator, type LinkEvaluator } from '../link/evaluator';
import { LinkInputError } from '../link/inputError';
import type { LinkMoment } from '../link/moment';
import type { LinkSetup } from '../link/setup';
import type { Site } from '../sky/limits';
import { bandById, bandOfFrequency } from '../station/bands';
import { modeById, type ModeId } from '../station/modes';
import { MINUTE_MS, type Interval } from '../time/interval';
import { qualityOf, type Quality, type QualityBasis } from './quality';
import { degradationCurve, sampleCurve, type QualityCurve } from './qualityBands';

/** A station as far as a judgement needs it; `setup` null where its equipment on the band is not known. */
export interface JudgedStation {
  callSign: string;
  site: Site;
  setup: LinkSetup | null;
}

/** By what the windows of a question are judged, and the means to do it. */
export interface Judge {
  basis: QualityBasis;
  /** "Judged by the margin of the weaker direction in Q65-60C." or why it is degradation instead. */
  sentence: string;
  /** Stations that lack equipment on the band. */
  missing: string[];
  /** Every pair; empty when judged by degradation. */
  links: readonly LinkEvaluator[];
  frequencyMhz: number;
}

/** With more stations the pairs are too many to follow a dragged limit. */
export const MOST_STATIONS_BY_MARGIN = 6;

/** Decides by what to judge. Frequency and mode are those of the question or the sked. */
export function judgeOf(
  stations: readonly JudgedStation[],
  frequencyMhz: number,
  mode: ModeId | null,
): Judge {
  const missing = stations.filter(({ setup }) => !setup).map(({ callSign }) => callSign);
  const byDegradation = (why: string): Judge => ({
    basis: 'degradation',
    sentence: `Judged by degradation, the path alone: ${why}`,
    missing,
    links: [],
    frequencyMhz,
  });
  if (mode === null) return byDegradation('no mode is chosen.');
  if (missing.length > 0) return byDegradation(`${missingWords(missing, frequencyMhz)}.`);
  if (stations.length < 2) return byDegradation('a margin needs two stations.');
  if (stations.length > MOST_STATIONS_BY_MARGIN) {
    return byDegradation(`margins are computed for up to ${MOST_STATIONS_BY_MARGIN} stations.`);
  }
  try {
    const pair = stations.length === 2;
    return {
      basis: 'margin',
      sentence: `Judged by the margin of the ${pair ? 'weaker direction' : 'weakest direction of any pair'} in ${modeById(mode).label}.`,
      missing,
      links: evaluators(stations, frequencyMhz, mode),
      frequencyMhz,
    };
  } catch (error) {
    if (!(error instanceof LinkInputError)) throw error;
    return byDegradation(`the equipment cannot be computed. ${error.message}`);
  }
}

/** "no equipment on 1296 MHz is known of QB7TID" */
export function missingWords(callSigns: readonly string[], frequencyMhz: number): string {
  const band = bandOfFrequency(frequencyMhz);
  const where = band === null ? `${frequencyMhz} MHz` : bandById(band).label;
  const names =
    callSigns.length < 2
      ? callSigns.join('')
      : `${callSigns.slice(0, -1).join(', ')} and ${callSigns.at(-1)}`;
  return `no equipment on ${where} is known of ${names}`;
}

function evaluators(
  stations: readonly JudgedStation[],
  frequencyMhz: number,
  mode: ModeId,
): LinkEvaluator[] {
  return stations.flatMap((first, index) =>
    stations.slice(index + 1).map((second) =>
      createLinkEvaluator(
        [
          { callSign: first.callSign, site: first.site, setup: first.setup! },
          { callSign: second.callSign, site: second.site, setup: second.setup! },
        ],
        frequencyMhz,
        mode,
      ),
    ),
  );
}

/** Nulls of linear polarisation last some ten minutes. */
const MARGIN_STEP_MS = 5 * MINUTE_MS;
const MARGIN_STEP_OF_MANY_MS = 10 * MINUTE_MS;

/** The quality over a table's span. A curve answers everything that is asked while limits are dragged. */
export function judgedCurve(judge: Judge, table: MoonTable): QualityCurve {
  if (judge.basis === 'degradation') {
    const model = degradationModel(judge.frequencyMhz);
    const moon = new Float64Array(3);
    return degradationCurve(table, (timeMs) => {
      table.moonNearlyOfDate(timeMs, moon);
      return skyAndDegradation(model, timeMs, moon).degradationDb;
    });
  }
  const moments = judge.links.map((link) => link.over(table));
  const wishedMs = moments.length === 1 ? MARGIN_STEP_MS : MARGIN_STEP_OF_MANY_MS;
  return sampleCurve('margin', table, wishedMs, (timeMs, stepMs) =>
    // One step beyond rise and set too, so that the edges of a window have a figure on both sides.
    upWithin(moments, timeMs, stepMs) ? leastMarginDb(moments, timeMs) : NaN,
  );
}

function upWithin(moments: readonly LinkMoment[], timeMs: number, stepMs: number): boolean {
  return [timeMs, timeMs - stepMs, timeMs + stepMs].some((atMs) =>
    moments.every((moment) => moment.look(atMs)),
  );
}

function leastMarginDb(moments: readonly LinkMoment[], timeMs: number): number {
  let least = Infinity;
  for (const moment of moments) {
    moment.compute(timeMs);
    least = Math.min(least, moment.marginDb);
  }
  return least;
}

/** The quality at one instant. Of many instants, take a curve. */
export function judgedAt(judge: Judge, timeMs: number, table?: MoonTable): Quality {
  if (judge.basis === 'degradation') {
    const { degradationDb } = skyAndDegradation(degradationModel(judge.frequencyMhz), timeMs);
    return qualityOf('degradation', degradationDb);
  }
  const around = table ?? buildMoonTable(aroundOf(timeMs));
  return qualityOf(
    'margin',
    leastMarginDb(
      judge.links.map((link) => link.over(around)),
      timeMs,
    ),
  );
}

function aroundOf(timeMs: number): Interval {
  return { startMs: timeMs - 30 * MINUTE_MS, endMs: timeMs + 30 * MINUTE_MS };
}
