import { formatDuration, formatNumber } from '../../time/format';
import { HOUR_MS, MINUTE_MS, type Interval } from '../../time/interval';
import { commonMoonUp, findCommonWindows, type WindowStation } from '../../window';
import { causeWords } from '../../window/sentences';
import type { OpenWish } from './explain';
import type { LeftOut } from './findings';
import type { PlanInput, PlanRules } from './input';
import { buildOptions, startsWithin, windowStation } from './options';

/** Why a wish has no start at all: the first of band, Moon, limits, hours, length and chance that leaves none. */
export function noOptionWords(
  input: PlanInput,
  open: OpenWish,
): Pick<LeftOut, 'reason' | 'sentence'> {
  const { rules } = input;
  const { wish, a, b } = open;
  if (a.never.includes(b.id) || b.never.includes(a.id)) {
    return {
      reason: 'never',
      sentence: 'One of them asked not to be put together with the other.',
    };
  }
  const bands = input.bands.filter(({ id }) => wish.bands.includes(id));
  if (!bands.some(({ id }) => a.setups[id] && b.setups[id])) {
    const labels = bands.map(({ label }) => label).join(' or ');
    const without = [a, b].find(({ setups }) => !bands.some(({ id }) => setups[id]));
    return {
      reason: 'noBand',
      sentence:
        without && labels !== ''
          ? `${without.callSign} has no equipment on ${labels}.`
          : 'They have no band in common.',
    };
  }
  const stations = [windowStation(a, rules), windowStation(b, rules)];
  const span = { startMs: input.startMs, endMs: input.endMs };
  const always = stations.map(({ callSign, site, sky }) => ({ callSign, site, sky }));
  const clear = findCommonWindows({ ...span, stations: always }).windows;
  if (clear.length === 0)
    return { reason: 'noMoon', sentence: noMoonSentence(span, always, rules) };
  const windows = findCommonWindows({ ...span, stations }).windows;
  if (windows.length === 0) {
    return {
      reason: 'noHours',
      sentence: `The Moon is clear for both for ${formatDuration(lengthOf(clear))}, but only while somebody sleeps or is away.`,
    };
  }
  if (!windows.some((window) => startsWithin(window, input.startMs, rules).length > 0)) {
    return { reason: 'noWindow', sentence: tooShortSentence(windows, rules) };
  }
  return { reason: 'lowChance', sentence: lowChanceSentence(input, open) };
}

/** "The Moon is never above 10° for both.", or which other limit takes most of the hours in which it is up. */
function noMoonSentence(span: Interval, stations: WindowStation[], rules: PlanRules): string {
  const { up } = commonMoonUp({ ...span, stations });
  if (up.length === 0) return 'The Moon is never above both horizons at once.';
  const low = stations.map(({ sky }) =>
    Math.max(sky.elevationFromDeg ?? 0, sky.transmitElevationFromDeg ?? 0),
  );
  const free = stations.map(({ callSign, site }, index) => ({
    callSign,
    site,
    sky: { elevationFromDeg: low[index] },
  }));
  if (findCommonWindows({ ...span, stations: free }).windows.length === 0) {
    const [first, second] = low as [number, number];
    return first === second
      ? `The Moon is never above ${degrees(first)} for both.`
      : `The Moon is never above ${degrees(first)} at ${stations[0]!.callSign} and above ${degrees(second)} at ${stations[1]!.callSign} at once.`;
  }
  const { lost } = findCommonWindows({ ...span, stations });
  const most = lost
    .filter(({ reason }) => reason !== 'horizon')
    .sort((one, other) => other.hours - one.hours)[0];
  const upFor = `The Moon is up for both for ${formatDuration(lengthOf(up))}`;
  if (!most) return `${upFor}, but always hidden or too low for somebody.`;
  const whose = causeWords(most, (callSign) => {
    const index = stations.findIndex((station) => station.callSign === callSign);
    return most.reason === 'elevationLimit' ? (low[index] ?? rules.leastElevationDeg) : null;
  });
  return `${upFor}, but always hidden: ${whose} alone takes ${formatDuration(most.hours * HOUR_MS)}.`;
}

function tooShortSentence(windows: readonly Interval[], rules: PlanRules): string {
  const longestMs = Math.max(...windows.map(({ startMs, endMs }) => endMs - startMs));
  return longestMs < rules.slotMinutes * MINUTE_MS
    ? `The longest common window is ${formatDuration(longestMs)}, shorter than a slot of ${rules.slotMinutes} min.`
    : `The longest common window is ${formatDuration(longestMs)}; no slot of ${rules.slotMinutes} min that begins on a step of ${rules.gridMinutes} min fits into it.`;
}

function lowChanceSentence(input: PlanInput, { wish, chances }: OpenWish): string {
  const rules = { ...input.rules, leastChance: 0 };
  const [options] = buildOptions({ ...input, rules, wishes: [wish] }, chances);
  const best = Math.max(0, ...(options ?? []).map(({ chance }) => chance));
  if (best === 0) return 'In every common window the signal is too weak: the chance is under 1 %.';
  return `The best chance is ${formatNumber(100 * best)} %, less than the ${formatNumber(100 * input.rules.leastChance)} % that you ask for.`;
}

function lengthOf(intervals: readonly Interval[]): number {
  return intervals.reduce((sum, { startMs, endMs }) => sum + endMs - startMs, 0);
}

function degrees(value: number): string {
  return `${formatNumber(value, value % 1 === 0 ? 0 : 1)}°`;
}
