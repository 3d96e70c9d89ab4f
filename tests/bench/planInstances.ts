import type {
  PlanBand,
  PlanInput,
  PlanInputStation,
  PlanInputWish,
} from '../../src/domain/activity/plan/input';
import { Numbers } from '../../src/domain/activity/plan/numbers';
import { buildOptions } from '../../src/domain/activity/plan/options';
import type { LinkSetup } from '../../src/domain/link/setup';
import { expandUsableHours, type Weekday } from '../../src/domain/time/weeklyHours';
import { HOUR_MS } from '../../src/domain/time/interval';

interface Region {
  zone: string;
  latitudeDeg: [number, number];
  longitudeDeg: [number, number];
  share: number;
}

const REGIONS: Region[] = [
  { zone: 'Europe/Berlin', latitudeDeg: [40, 62], longitudeDeg: [-5, 28], share: 0.45 },
  { zone: 'America/New_York', latitudeDeg: [28, 48], longitudeDeg: [-95, -70], share: 0.25 },
  { zone: 'America/Sao_Paulo', latitudeDeg: [-35, -10], longitudeDeg: [-65, -45], share: 0.08 },
  { zone: 'Asia/Tokyo', latitudeDeg: [31, 43], longitudeDeg: [125, 142], share: 0.12 },
  { zone: 'Australia/Sydney', latitudeDeg: [-42, -25], longitudeDeg: [116, 153], share: 0.1 },
];

const BANDS: PlanBand[] = [
  { id: '432', label: '432 MHz', frequencyMhz: 432.1, mode: 'q65-60b' },
  { id: '1296', label: '1296 MHz', frequencyMhz: 1296.1, mode: 'q65-60c' },
];

/** 48 hours with the Moon near the equator, so that hours are scarce everywhere. */
const START_MS = Date.UTC(2027, 1, 9);

/**
 * An invented weekend, always the same for the same numbers: stations in Europe, the Americas, East Asia and Oceania
 * with lowest elevations, blocked sectors, nights of sleep and equipment of their own on one or two bands.
 */
export function planWeekend(stations: number, wishes: number | 'everyone', seed = 1): PlanInput {
  const numbers = new Numbers(seed);
  const roster = Array.from({ length: stations }, (_, index) => station(index, stations, numbers));
  const input: PlanInput = {
    startMs: START_MS,
    endMs: START_MS + 48 * HOUR_MS,
    rules: {
      gridMinutes: 15,
      slotMinutes: 30,
      bandChangeMinutes: 15,
      mostInARow: 6,
      leastPauseMinutes: 30,
      leastElevationDeg: 0,
      leastChance: 0.1,
    },
    bands: BANDS,
    stations: roster,
    wishes: [],
  };
  const asked =
    wishes === 'everyone' ? allPairs(roster, numbers) : possiblePairs(input, wishes, numbers);
  return { ...input, wishes: asked };
}

function between(numbers: Numbers, [from, to]: readonly [number, number]): number {
  return from + (to - from) * numbers.share();
}

function regionOf(index: number, stations: number): Region {
  const at = (index + 0.5) / stations;
  let sum = 0;
  return REGIONS.find(({ share }) => (sum += share) > at) ?? REGIONS.at(-1)!;
}

function station(index: number, stations: number, numbers: Numbers): PlanInputStation {
  const region = regionOf(index, stations);
  const site = {
    latitudeDeg: between(numbers, region.latitudeDeg),
    longitudeDeg: between(numbers, region.longitudeDeg),
    heightM: 500 * numbers.share(),
  };
  const sleepFrom = 22 + numbers.below(3);
  const wakeAt = 6 + numbers.below(3);
  const blockedFrom = 360 * numbers.share();
  const awayFrom = 9 + numbers.below(9);
  const awayTo = awayFrom + 3 + numbers.below(3);
  const clock = (hour: number) => `${String(hour % 24).padStart(2, '0')}:00`;
  const weekly = ([1, 2, 3, 4, 5, 6, 7] as Weekday[]).flatMap((weekday) => [
    { weekday, from: clock(wakeAt), to: clock(awayFrom) },
    { weekday, from: clock(awayTo), to: clock(sleepFrom) },
  ]);
  const span = { startMs: START_MS, endMs: START_MS + 48 * HOUR_MS };
  const both = numbers.share() < 0.4;
  const first = numbers.share() < 0.3 ? '432' : '1296';
  const setups: Record<string, LinkSetup> = {};
  for (const { id, frequencyMhz } of BANDS) {
    if (both || id === first) setups[id] = setup(frequencyMhz, numbers);
  }
  return {
    id: `s${index}`,
    callSign: `Q${String.fromCharCode(65 + (index % 26))}${index}X`,
    site,
    sky: {
      elevationFromDeg: 3 + 12 * numbers.share(),
      ...(index % 3 === 0
        ? {
            blocked: [
              {
                azimuthFromDeg: blockedFrom,
                azimuthToDeg: (blockedFrom + 30) % 360,
                elevationFromDeg: 0,
                elevationToDeg: 30,
                name: 'trees',
              },
            ],
          }
        : {}),
    },
    usable: expandUsableHours({ timeZone: region.zone, weekly, daysOff: [] }, span),
    setups,
    most: 40,
    never: [],
  };
}

function setup(frequencyMhz: number, numbers: Numbers): LinkSetup {
  const diameterM = frequencyMhz < 1000 ? 5 + 4 * numbers.share() : 2 + 2.5 * numbers.share();
  return {
    antenna: { kind: 'dish', diameterM, apertureEfficiency: 0.55 },
    polarization: frequencyMhz < 1000 ? 'horizontal' : 'rightCircular',
    powerAtFeedW: 100 + 500 * numbers.share(),
    receive: { kind: 'measured', systemTemperatureK: 60 + 60 * numbers.share() },
  };
}

function wish(a: PlanInputStation, b: PlanInputStation, numbers: Numbers): PlanInputWish {
  const bands = BANDS.map(({ id }) => id).filter((id) => a.setups[id] && b.setups[id]);
  const at = numbers.share();
  return {
    id: `${a.id}-${b.id}`,
    a: a.id,
    b: b.id,
    priority: at < 0.5 ? 1 : at < 0.8 ? 2 : 3,
    bands: bands.length > 0 ? bands : BANDS.map(({ id }) => id),
  };
}

function allPairs(roster: readonly PlanInputStation[], numbers: Numbers): PlanInputWish[] {
  return roster.flatMap((a, at) => roster.slice(at + 1).map((b) => wish(a, b, numbers)));
}

/** So many different pairs that have at least one possible start, drawn by lot. */
function possiblePairs(input: PlanInput, count: number, numbers: Numbers): PlanInputWish[] {
  const drawn = allPairs(input.stations, numbers)
    .map((one) => ({ one, place: numbers.word() }))
    .sort((first, second) => first.place - second.place)
    .map(({ one }) => one);
  const options = buildOptions({ ...input, wishes: drawn });
  const possible = drawn.filter((_, index) => options[index]!.length > 0);
  if (possible.length < count) throw new Error(`Only ${possible.length} pairs are possible.`);
  return possible.slice(0, count);
}
