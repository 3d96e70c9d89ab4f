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
const RUNS_A_ROUND = 30;
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
  const ratios: number[] = [];
  let peerMs = 0;
  const part = STATIONS / ROUNDS;
  for (let round = 0; round < ROUNDS; round += 1) {
    const block = Array.from({ length: RUNS_A_ROUND }, (_, call) =>
      timed(() => allPairsOnce(stations, call)),
    );
    const partMs = timed(() => searchAltitude(round * part, (round + 1) * part));
    const meanMs = block.reduce((sum, tookMs) => sum + tookMs, 0) / block.length;
    ratios.push((partMs * ROUNDS) / meanMs);
    own.push(...block);
    peerMs += partMs;
  }
  const warmMs = median(own);
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
      value: median(ratios),
      unit: 'times faster',
      peer: 'astronomy-engine 2.1.19 SearchAltitude at 0° once for each station, no pairs',
      note: `rises and sets of all stations in ${peerMs.toFixed(0)} ms, ${ROUNDS} parts each beside a block of our runs; median of the ratios of mean times, least ${Math.min(...ratios).toFixed(0)}, most ${Math.max(...ratios).toFixed(0)}`,
    },
  ];
}

export const allPairs500x72h: Bench = { name: 'windows.allPairs500x72h', run };
