import { Body, Equator, Horizon, MakeTime, Observer, SearchAltitude } from 'astronomy-engine';
import { DAY_MS, type Interval } from '../../src/domain/time/interval';
import { findCommonWindows } from '../../src/domain/window';
import { pair } from './pair';
import { median, timed, type Bench, type BenchResult } from './results';

const DAYS = 30;
const MINUTES = DAYS * 1440;
const SPAN: Interval = {
  startMs: Date.UTC(2027, 0, 1),
  endMs: Date.UTC(2027, 0, 1) + DAYS * DAY_MS,
};
const J2000_MS = 946_728_000_000;
const START_DAY = (SPAN.startMs - J2000_MS) / DAY_MS;

const WARM_UP = 200;
const ROUNDS = 7;
/** Blocks of about the same length, so that a busy machine slows all three alike. */
const OURS_A_BLOCK = 400;
const SEARCHES_A_BLOCK = 30;

const observers = pair.map(
  ({ site }) => new Observer(site.latitudeDeg, site.longitudeDeg, site.heightM),
);

/** Windows with edges, every sky limit, and the ephemeris made anew. */
function ours(): number {
  return findCommonWindows({ ...SPAN, stations: pair }).windows.length;
}

/** The plain way: both stations' Moon every minute. Minutes with both above the horizon are counted. */
function everyMinute(): number {
  let common = 0;
  for (let minute = 0; minute < MINUTES; minute += 1) {
    const time = MakeTime(START_DAY + minute / 1440);
    let up = 0;
    for (const observer of observers) {
      const { ra, dec } = Equator(Body.Moon, time, observer, true, true);
      if (Horizon(time, observer, ra, dec).altitude > 0) up += 1;
    }
    if (up === observers.length) common += 1;
  }
  return common;
}

/** The library's own search: rises and sets of both stations, elevation 0 only. */
function searchAltitude(): number {
  let events = 0;
  for (const observer of observers) {
    for (const direction of [1, -1]) {
      let time = MakeTime(START_DAY);
      for (;;) {
        const event = SearchAltitude(Body.Moon, observer, direction, time, 2, 0);
        if (!event || event.ut > START_DAY + DAYS) break;
        events += 1;
        time = event.AddDays(1e-3);
      }
    }
  }
  return events;
}

/** Mean milliseconds of a call in a block of calls. */
function block(work: () => unknown, calls: number): number {
  const tookMs = timed(() => {
    for (let call = 0; call < calls; call += 1) work();
  });
  return tookMs / calls;
}

export const windowsPair30d: Bench = { name: 'windows.pair30d', run };

function run(): BenchResult[] {
  for (let call = 0; call < WARM_UP; call += 1) ours();
  everyMinute();
  for (let call = 0; call < 10; call += 1) searchAltitude();
  const own: number[] = [];
  const minutes: number[] = [];
  const searches: number[] = [];
  for (let round = 0; round < ROUNDS; round += 1) {
    own.push(block(ours, OURS_A_BLOCK));
    minutes.push(block(everyMinute, 1));
    searches.push(block(searchAltitude, SEARCHES_A_BLOCK));
  }
  const ownMs = median(own);
  const minutesMs = median(minutes);
  const searchesMs = median(searches);
  const note = (peerMs: number) =>
    `medians of ${ROUNDS} alternating blocks: ${ownMs.toFixed(2)} ms with every sky limit and the ephemeris, peer ${peerMs.toFixed(1)} ms`;
  return [
    {
      name: 'windows.pair30d.ratioPerMinute',
      value: minutesMs / ownMs,
      unit: 'times faster',
      peer: 'astronomy-engine 2.1.19 Equator + Horizon every minute',
      note: note(minutesMs),
    },
    {
      name: 'windows.pair30d.ratioSearchAltitude',
      value: searchesMs / ownMs,
      unit: 'times faster',
      peer: 'astronomy-engine 2.1.19 SearchAltitude at 0°, both stations',
      note: note(searchesMs),
    },
  ];
}
