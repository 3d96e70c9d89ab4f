import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { Body, MakeTime, Observer, SearchAltitude } from 'astronomy-engine';
import { pairCount } from '../../src/domain/window/allPairs';
import { allPairsOnce } from './allPairsOnce';
import { manyStations } from './manyStations';
import { median, timed, type Bench, type BenchResult } from './results';

const STATIONS = 500;
const START_DAY = (Date.UTC(2027, 0, 1) - 946_728_000_000) / 86_400_000;
const WARM_UP = 150;
const ROUNDS = 5;
const RUNS_A_ROUND = 20;
const COLD_RUNS = 7;

const stations = manyStations(STATIONS);

/** The library's own search of the same span: rises and sets at elevation 0 of the stations from … to. */
function searchAltitude(from: number, to: number): number {
  let events = 0;
  for (const { site } of stations.slice(from, to)) {
    const observer = new Observer(site.latitudeDeg, site.longitudeDeg, site.heightM);
    for (const direction of [1, -1]) {
      let time = MakeTime(START_DAY);
      for (;;) {
        const event = SearchAltitude(Body.Moon, observer, direction, time, 2, 0);
        if (!event || event.ut > START_DAY + 3) break;
        events += 1;
        time = event.AddDays(1e-3);
      }
    }
  }
  return events;
}

/** Milliseconds that a process new for it takes, from the end of its imports to the last pair. */
function coldMs(): number {
  const script = fileURLToPath(new URL('allPairsCold.ts', import.meta.url));
  const { stdout, stderr, status } = spawnSync(process.execPath, ['--import', 'tsx', script], {
    encoding: 'utf8',
  });
  if (status !== 0) throw new Error(`The cold process failed: ${stderr}`);
  return Number(stdout);
}

function run(): BenchResult[] {
  for (let call = 0; call < WARM_UP; call += 1) allPairsOnce(stations, call);
  searchAltitude(0, 5);
  const own: number[] = [];
  let peerMs = 0;
  for (let round = 0; round < ROUNDS; round += 1) {
    for (let call = 0; call < RUNS_A_ROUND; call += 1) {
      own.push(timed(() => allPairsOnce(stations, call)));
    }
    const part = STATIONS / ROUNDS;
    peerMs += timed(() => searchAltitude(round * part, (round + 1) * part));
  }
  const warmMs = median(own);
  const meanMs = own.reduce((sum, tookMs) => sum + tookMs, 0) / own.length;
  const cold = Array.from({ length: COLD_RUNS }, coldMs);
  const all = `${pairCount(STATIONS)} pairs of ${STATIONS} stations with own sky limits, ephemeris included, one thread`;
  const least = (values: number[]) => `least ${Math.min(...values).toFixed(1)} ms`;
  return [
    {
      name: 'windows.allPairs500x72h.warmMs',
      value: warmMs,
      unit: 'ms',
      note: `${all}; median of ${own.length} runs, ${least(own)}`,
    },
    {
      name: 'windows.allPairs500x72h.coldMs',
      value: median(cold),
      unit: 'ms',
      note: `the same, first call in a new process, after Node has started and the modules are loaded; median of ${COLD_RUNS} processes, ${least(cold)}`,
    },
    {
      name: 'windows.allPairs500x72h.ratioSearchAltitude',
      value: peerMs / meanMs,
      unit: 'times faster',
      peer: 'astronomy-engine 2.1.19 SearchAltitude at 0° once for each station, no pairs',
      note: `rises and sets of ${STATIONS} stations ${peerMs.toFixed(0)} ms in ${ROUNDS} parts between our runs, whose mean is ${meanMs.toFixed(2)} ms`,
    },
  ];
}

export const allPairs500x72h: Bench = { name: 'windows.allPairs500x72h', run };
