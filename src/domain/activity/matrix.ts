import { buildMoonTable, type MoonTable } from '../ephemeris/table';
import { degradationModel, skyAndDegradation } from '../link/degradation';
import { createLinkEvaluator } from '../link/evaluator';
import type { LinkSetup } from '../link/setup';
import type { Site, SkyLimits } from '../sky/limits';
import { MINUTE_MS, type Interval } from '../time/interval';
import { forEachPair, type PairWindows } from '../window/allPairs';
import { qualityOf, type Quality } from '../window/quality';
import { seenTimes } from '../window/seenTimes';

export interface MatrixStation {
  id: string;
  callSign: string;
  site: Site;
  sky: SkyLimits;
  usable: Interval[];
  /** Null: its equipment on the band is not known. */
  setup: LinkSetup | null;
}

/** What two stations have in common on one band within an activity, before anything is planned. */
export interface MatrixPair {
  /** Ids; `a` comes first on the roster. */
  a: string;
  b: string;
  windows: Interval[];
  /** Of all windows together. */
  lengthMs: number;
  /** At the best moment. Margin where the equipment of both is known, else degradation. */
  best: Quality;
  bestMs: number;
  /** Of the contact at its likeliest moment; null without equipment. */
  chance: number | null;
}

export interface MatrixQuestion extends Interval {
  /** In the order of the roster. */
  stations: readonly MatrixStation[];
  frequencyMhz: number;
  mode: string;
  slotMinutes: number;
}

const STEP_MS = 15 * MINUTE_MS;

/** Every pair with a common window in which a slot fits. Windows are searched exactly, quality every quarter of an hour. */
export function pairMatrix(question: MatrixQuestion): MatrixPair[] {
  const { stations, slotMinutes } = question;
  if (stations.length < 2) return [];
  const span = { startMs: question.startMs, endMs: question.endMs };
  const table = buildMoonTable(span);
  const seen = seenTimes(span, stations);
  const pathOnly = degradationAt(question.frequencyMhz, table);
  const pairs: MatrixPair[] = [];
  forEachPair(seen, slotMinutes, (first, second, found) => {
    const windows = intervalsOf(found);
    if (windows.length === 0) return;
    const a = stations[first]!;
    const b = stations[second]!;
    pairs.push({
      a: a.id,
      b: b.id,
      windows,
      lengthMs: windows.reduce((sum, { startMs, endMs }) => sum + endMs - startMs, 0),
      ...bestOf(question, a, b, windows, table, pathOnly),
    });
  });
  return pairs;
}

function intervalsOf({ beginsMs, endsMs, from, to }: PairWindows): Interval[] {
  const windows: Interval[] = [];
  for (let at = from; at < to; at += 1) {
    windows.push({ startMs: beginsMs[at]!, endMs: endsMs[at]! });
  }
  return windows;
}

function bestOf(
  question: MatrixQuestion,
  a: MatrixStation,
  b: MatrixStation,
  windows: readonly Interval[],
  table: MoonTable,
  pathOnly: (timeMs: number) => number,
): Pick<MatrixPair, 'best' | 'bestMs' | 'chance'> {
  if (!a.setup || !b.setup) {
    let leastDb = Infinity;
    let bestMs = windows[0]!.startMs;
    for (const timeMs of momentsOf(windows)) {
      const db = pathOnly(timeMs);
      if (db < leastDb) [leastDb, bestMs] = [db, timeMs];
    }
    return { best: qualityOf('degradation', leastDb), bestMs, chance: null };
  }
  const { frequencyMhz, mode, slotMinutes } = question;
  const moment = createLinkEvaluator(
    [
      { callSign: a.callSign, site: a.site, setup: a.setup },
      { callSign: b.callSign, site: b.site, setup: b.setup },
    ],
    frequencyMhz,
    mode,
    { chance: { slotMinutes } },
  ).over(table);
  let mostDb = -Infinity;
  let bestMs = windows[0]!.startMs;
  let chance = 0;
  for (const timeMs of momentsOf(windows)) {
    moment.compute(timeMs);
    if (moment.marginDb > mostDb) [mostDb, bestMs] = [moment.marginDb, timeMs];
    chance = Math.max(chance, moment.contactChance);
  }
  return { best: qualityOf('margin', mostDb), bestMs, chance };
}

/** Instants on the common steps within the windows, and the middle of each. */
function* momentsOf(windows: readonly Interval[]): Generator<number> {
  for (const { startMs, endMs } of windows) {
    yield Math.round((startMs + endMs) / 2);
    for (let at = Math.ceil(startMs / STEP_MS) * STEP_MS; at < endMs; at += STEP_MS) yield at;
  }
}

/** Degradation belongs to the Moon alone, so each instant is worked out once for all pairs. */
function degradationAt(frequencyMhz: number, table: MoonTable): (timeMs: number) => number {
  const model = degradationModel(frequencyMhz);
  const moon = new Float64Array(3);
  const known = new Map<number, number>();
  return (timeMs) => {
    let db = known.get(timeMs);
    if (db === undefined) {
      table.moonNearlyOfDate(timeMs, moon);
      db = skyAndDegradation(model, timeMs, moon).degradationDb;
      known.set(timeMs, db);
    }
    return db;
  };
}
