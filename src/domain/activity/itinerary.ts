import { bandById } from '../station/bands';
import { formatLocalRange, formatUtcRange } from '../time/format';
import type { RevisionDiff, RevisionSlot } from './revision';

/** What one slot is to one of its stations. */
export interface ItineraryLine {
  partner: string;
  utc: string;
  /** In the reader's zone; null where that is UTC. */
  local: string | null;
  band: string;
}

/** A station's slots in order of time, as its crew reads them. */
export function itineraryOf(
  slots: readonly RevisionSlot[],
  stationId: string,
  callSigns: ReadonlyMap<string, string>,
  timeZone: string,
): ItineraryLine[] {
  return slots
    .filter((slot) => slot.stationA === stationId || slot.stationB === stationId)
    .sort((a, b) => a.startMs - b.startMs)
    .map((slot) => lineOf(slot, stationId, callSigns, timeZone));
}

/** What a revision changes for a station, one sentence a slot, in order of time. */
export function changesOf(
  diff: RevisionDiff,
  stationId: string,
  callSigns: ReadonlyMap<string, string>,
): string[] {
  const told = (slot: RevisionSlot) => {
    const { partner, band } = lineOf(slot, stationId, callSigns, 'UTC');
    return `${partner} on ${band}`;
  };
  const changes = [
    ...diff.added.map((slot) => ({
      atMs: slot.startMs,
      text: `New: ${told(slot)}, ${formatUtcRange(slot)}.`,
    })),
    ...diff.moved.map(({ before, after }) => ({
      atMs: after.startMs,
      text: `Moved: ${told(after)}, from ${formatUtcRange(before)} to ${formatUtcRange(after)}.`,
    })),
    ...diff.removed.map((slot) => ({
      atMs: slot.startMs,
      text: `Taken out: ${told(slot)}, ${formatUtcRange(slot)}.`,
    })),
  ];
  return changes.sort((a, b) => a.atMs - b.atMs).map(({ text }) => text);
}

function lineOf(
  slot: RevisionSlot,
  stationId: string,
  callSigns: ReadonlyMap<string, string>,
  timeZone: string,
): ItineraryLine {
  const partnerId = slot.stationA === stationId ? slot.stationB : slot.stationA;
  return {
    partner: callSigns.get(partnerId) ?? '',
    utc: formatUtcRange(slot),
    local: timeZone === 'UTC' ? null : formatLocalRange(slot, timeZone),
    band: bandById(slot.band).label,
  };
}
