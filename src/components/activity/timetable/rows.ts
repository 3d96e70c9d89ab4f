import type { TimetableSlot, TimetableView } from '../../../domain/activity/timetableView';
import { bandById, type BandId } from '../../../domain/station/bands';
import { formatUtcRange } from '../../../domain/time/format';
import { MINUTE_MS } from '../../../domain/time/interval';
import { spanOf, xOf } from './geometry';

/** A slot as it stands in the row of one of its two stations. */
export interface Chip {
  slot: TimetableSlot;
  /** Roster number of the other station. */
  partner: number;
  label: string;
  leftPx: number;
  widthPx: number;
  /** Place of its band among those of the activity. */
  tone: number;
}

/** The slots of each station in order of time. */
export function rowsOf(view: TimetableView): Chip[][] {
  const { stations, problem } = view;
  const span = spanOf(view, problem);
  const wishes = new Map(problem.wishes.map((wish) => [wish.id, wish]));
  const tones = new Map(view.bands.map(({ band }, index) => [band as string, index]));
  const rows: Chip[][] = stations.map(() => []);
  for (const slot of [...view.slots].sort((a, b) => a.startMs - b.startMs)) {
    const { a, b } = wishes.get(slot.wishId)!;
    const time = {
      startMs: slot.startMs,
      endMs: slot.startMs + problem.slotMinutes * MINUTE_MS,
    };
    const leftPx = xOf(span, time.startMs);
    const words = `${formatUtcRange(time)}, ${bandById(slot.band as BandId).label}${slot.pinned ? ', fixed' : ''}`;
    for (const [own, other] of [
      [a, b],
      [b, a],
    ] as const) {
      rows[own]!.push({
        slot,
        partner: stations[other]!.place,
        label: `${stations[own]!.callSign} with ${stations[other]!.callSign}, ${words}`,
        leftPx,
        widthPx: xOf(span, time.endMs) - leftPx - 1.5,
        tone: tones.get(slot.band) ?? 0,
      });
    }
  }
  return rows;
}
