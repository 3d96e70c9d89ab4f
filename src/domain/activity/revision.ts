import type { BandId } from '../station/bands';
import type { Interval } from '../time/interval';

/** One contact of a plan. The pair on its band is what it is known by through all revisions. */
export interface RevisionSlot extends Interval {
  /** Comes before `stationB` on the roster. */
  stationA: string;
  stationB: string;
  band: BandId;
  pinned: boolean;
  priority: 1 | 2 | 3;
  /** Of completing the contact, 0 … 1; null where a station has no equipment described. */
  chance: number | null;
  /** Of the weaker direction, in dB. */
  marginDb: number | null;
}

/** "A B 1296": the same contact in every revision, whenever it takes place and however the roster is numbered. */
export function slotKey({
  stationA,
  stationB,
  band,
}: Pick<RevisionSlot, 'stationA' | 'stationB' | 'band'>): string {
  const [first, second] = stationA < stationB ? [stationA, stationB] : [stationB, stationA];
  return `${first} ${second} ${band}`;
}

export interface RevisionDiff<S extends RevisionSlot = RevisionSlot> {
  added: S[];
  removed: S[];
  moved: { before: S; after: S }[];
  /** As they were, at the same time; the newer of the two. */
  kept: S[];
}

/** What a revision changes against the one before it, each list in order of time. */
export function diffRevisions<S extends RevisionSlot>(
  before: readonly S[],
  after: readonly S[],
): RevisionDiff<S> {
  const old = new Map(before.map((slot) => [slotKey(slot), slot]));
  const diff: RevisionDiff<S> = { added: [], removed: [], moved: [], kept: [] };
  for (const slot of inTime(after)) {
    const earlier = old.get(slotKey(slot));
    old.delete(slotKey(slot));
    if (!earlier) diff.added.push(slot);
    else if (earlier.startMs === slot.startMs && earlier.endMs === slot.endMs) diff.kept.push(slot);
    else diff.moved.push({ before: earlier, after: slot });
  }
  diff.removed = inTime([...old.values()]);
  return diff;
}

/** The part of a difference in which the station takes part. */
export function diffOfStation<S extends RevisionSlot>(
  diff: RevisionDiff<S>,
  stationId: string,
): RevisionDiff<S> {
  const has = (slot: RevisionSlot) => slot.stationA === stationId || slot.stationB === stationId;
  return {
    added: diff.added.filter(has),
    removed: diff.removed.filter(has),
    moved: diff.moved.filter(({ after }) => has(after)),
    kept: diff.kept.filter(has),
  };
}

export function changesAnything(diff: RevisionDiff): boolean {
  return diff.added.length + diff.removed.length + diff.moved.length > 0;
}

/** Slots of one station that overlap, as pairs; an empty list is what a plan must have. */
export function overlapsOf<S extends RevisionSlot>(
  slots: readonly S[],
): { stationId: string; first: S; second: S }[] {
  const found: { stationId: string; first: S; second: S }[] = [];
  const byStation = new Map<string, S[]>();
  for (const slot of inTime(slots)) {
    for (const stationId of [slot.stationA, slot.stationB]) {
      const earlier = byStation.get(stationId) ?? [];
      for (const first of earlier) {
        if (first.endMs > slot.startMs) found.push({ stationId, first, second: slot });
      }
      byStation.set(stationId, [...earlier, slot]);
    }
  }
  return found;
}

function inTime<S extends RevisionSlot>(slots: readonly S[]): S[] {
  return [...slots].sort((a, b) => a.startMs - b.startMs || compareText(slotKey(a), slotKey(b)));
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
