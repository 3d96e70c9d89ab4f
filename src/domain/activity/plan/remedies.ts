import { moonSampleDirect } from '../../ephemeris';
import { formatClock, formatNumber, formatUtc } from '../../time/format';
import { HOUR_MS, MINUTE_MS, unionIntervals, type Interval } from '../../time/interval';
import type { OpenWish } from './explain';
import type { Remedy } from './findings';
import type { PlanInput, PlanInputStation } from './input';
import { buildOptions } from './options';
import { Standing } from './standing';
import type { PlanOption, PlanSlot } from './types';

/** How far a lowest elevation is tried to be lowered. */
const LOWER_BY_DEG = 10;

/** What would let a wish into the plan with everything else as it stands; each was computed and fits. */
export function remediesFor(
  input: PlanInput,
  standing: Standing,
  slots: readonly PlanSlot[],
  open: OpenWish,
): Remedy[] {
  const { wish, a, b } = open;
  const both = [wish.a, wish.b];
  const fits = ({ band, startMs }: PlanOption) =>
    standing.against(both, band, startMs).length === 0;
  return [
    ...oneMore(input, slots, standing, open),
    ...moveOne(input, standing, open, slots),
    ...[a, b].flatMap((station) => moreHours(input, open, station, fits)),
    ...otherBand(input, open, fits),
    ...lowerElevation(input, open, fits),
    ...lessChance(input, open, fits),
  ];
}

type Fits = (option: PlanOption) => boolean;

function optionsWith(
  input: PlanInput,
  { wish, chances }: OpenWish,
  change: Partial<PlanInput>,
  bands = wish.bands,
): PlanOption[] {
  const changed = { ...input, ...change };
  const stations = changed.stations.filter(({ id }) => id === wish.a || id === wish.b);
  return buildOptions({ ...changed, stations, wishes: [{ ...wish, bands }] }, chances)[0] ?? [];
}

/** The option with the best chance that fits; the earliest of those. */
function bestOf(options: readonly PlanOption[], fits: Fits): PlanOption | null {
  return options
    .filter(fits)
    .reduce<PlanOption | null>(
      (best, one) => (best && best.chance >= one.chance ? best : one),
      null,
    );
}

function oneMore(
  input: PlanInput,
  slots: readonly PlanSlot[],
  standing: Standing,
  { wish, a, b, options }: OpenWish,
): Remedy[] {
  const full = [a, b].filter(({ id, most }) => standing.count(id) >= most);
  if (full.length === 0) return [];
  const stations = input.stations.map((station) =>
    full.includes(station) ? { ...station, most: standing.count(station.id) + 1 } : station,
  );
  const roomier = new Standing({ ...input, stations }, slots);
  const option = bestOf(
    options,
    ({ band, startMs }) => roomier.against([wish.a, wish.b], band, startMs).length === 0,
  );
  if (!option) return [];
  const where = full.map(({ callSign }) => callSign).join(' and ');
  return [
    {
      kind: 'oneMore',
      sentence: `One contact more at ${where} lets it in, ${formatUtc(option.startMs)}.`,
    },
  ];
}

/** A start at which only one other slot is in the way, and that one can go somewhere else. */
function moveOne(
  input: PlanInput,
  standing: Standing,
  { wish, options }: OpenWish,
  slots: readonly PlanSlot[],
): Remedy[] {
  const callSigns = new Map(input.stations.map(({ id, callSign }) => [id, callSign]));
  const inTheWay = new Map<string, PlanOption>();
  for (const option of options) {
    const against = standing.against([wish.a, wish.b], option.band, option.startMs);
    const wishIds = new Set(against.map(({ wishId }) => wishId));
    const [only] = wishIds;
    if (wishIds.size === 1 && only && !inTheWay.has(only)) inTheWay.set(only, option);
  }
  for (const [otherId, option] of inTheWay) {
    const other = input.wishes.find(({ id }) => id === otherId);
    if (!other) continue;
    const rest = slots.filter(({ wishId }) => wishId !== otherId);
    const withNew = new Standing(input, [...rest, { ...option, wishId: wish.id }]);
    const stations = input.stations.filter(({ id }) => id === other.a || id === other.b);
    const elsewhere = bestOf(
      buildOptions({ ...input, stations, wishes: [other] })[0] ?? [],
      ({ band, startMs }) => withNew.against([other.a, other.b], band, startMs).length === 0,
    );
    if (!elsewhere) continue;
    return [
      {
        kind: 'moveOne',
        sentence: `It fits ${formatUtc(option.startMs)} when ${callSigns.get(other.a)} – ${callSigns.get(other.b)} moves to ${formatUtc(elsewhere.startMs)}.`,
      },
    ];
  }
  return [];
}

/** One hour more at the station, before or after any of its hours. */
function moreHours(
  input: PlanInput,
  open: OpenWish,
  station: PlanInputStation,
  fits: Fits,
): Remedy[] {
  const { usable } = station;
  if (!usable) return [];
  const longer = unionIntervals(
    usable.map(({ startMs, endMs }) => ({
      startMs: Math.max(startMs - HOUR_MS, input.startMs),
      endMs: Math.min(endMs + HOUR_MS, input.endMs),
    })),
  );
  const stations = input.stations.map((one) =>
    one === station ? { ...one, usable: longer } : one,
  );
  const option = bestOf(optionsWith(input, open, { stations }), fits);
  if (!option) return [];
  const slot = {
    startMs: option.startMs,
    endMs: option.startMs + input.rules.slotMinutes * MINUTE_MS,
  };
  const until = usable.some(({ endMs }) => endMs > slot.startMs - HOUR_MS && endMs < slot.endMs);
  const edge = until
    ? `until ${formatClock(slot.endMs)} UTC`
    : `from ${formatClock(slot.startMs)} UTC`;
  return [
    {
      kind: 'moreHours',
      sentence: `It fits ${formatUtc(slot.startMs)} when somebody is at ${station.callSign} ${edge}.`,
    },
  ];
}

function otherBand(input: PlanInput, open: OpenWish, fits: Fits): Remedy[] {
  const { wish, a, b } = open;
  const others = input.bands.filter(
    ({ id }) => !wish.bands.includes(id) && a.setups[id] && b.setups[id],
  );
  for (const { id, label } of others) {
    const option = bestOf(optionsWith(input, open, {}, [id]), fits);
    if (option) {
      return [{ kind: 'otherBand', sentence: `On ${label} it fits ${formatUtc(option.startMs)}.` }];
    }
  }
  return [];
}

/** Lowest elevations lowered, each station's own and the activity's; says how low the Moon then stands. */
function lowerElevation(input: PlanInput, open: OpenWish, fits: Fits): Remedy[] {
  const { a, b } = open;
  const lowered = (limitDeg: number | undefined) =>
    limitDeg === undefined || limitDeg <= 0 ? limitDeg : Math.max(0, limitDeg - LOWER_BY_DEG);
  const stations = input.stations.map((station) =>
    station === a || station === b
      ? {
          ...station,
          sky: {
            ...station.sky,
            elevationFromDeg: lowered(station.sky.elevationFromDeg),
            transmitElevationFromDeg: lowered(station.sky.transmitElevationFromDeg),
          },
        }
      : station,
  );
  const rules = { ...input.rules, leastElevationDeg: lowered(input.rules.leastElevationDeg) ?? 0 };
  const option = bestOf(optionsWith(input, open, { stations, rules }), fits);
  if (!option) return [];
  const low = [a, b].flatMap((station) => {
    const leastDeg = lowestDeg(input, station, option);
    const limitDeg = Math.max(
      station.sky.elevationFromDeg ?? 0,
      station.sky.transmitElevationFromDeg ?? 0,
      input.rules.leastElevationDeg,
    );
    if (leastDeg >= limitDeg) return [];
    const needed = Math.max(0, Math.floor(leastDeg));
    return [`${formatNumber(needed)}° at ${station.callSign}`];
  });
  if (low.length === 0) return [];
  return [
    {
      kind: 'lowerElevation',
      sentence: `With a lowest elevation of ${low.join(' and ')} it fits ${formatUtc(option.startMs)}.`,
    },
  ];
}

function lowestDeg(input: PlanInput, { site }: PlanInputStation, { startMs }: PlanOption): number {
  const slot: Interval = { startMs, endMs: startMs + input.rules.slotMinutes * MINUTE_MS };
  return Math.min(
    moonSampleDirect(site, slot.startMs).elevationDeg,
    moonSampleDirect(site, slot.endMs).elevationDeg,
  );
}

function lessChance(input: PlanInput, open: OpenWish, fits: Fits): Remedy[] {
  if (input.rules.leastChance <= 0) return [];
  const rules = { ...input.rules, leastChance: 0 };
  const option = bestOf(optionsWith(input, open, { rules }), fits);
  if (!option || option.chance >= input.rules.leastChance) return [];
  return [
    {
      kind: 'lessChance',
      sentence: `With a chance of ${formatNumber(100 * option.chance)} % it fits ${formatUtc(option.startMs)}.`,
    },
  ];
}
