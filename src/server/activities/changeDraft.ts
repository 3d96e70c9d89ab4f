import { z } from 'zod';
import type { PlanSlot } from '../../domain/activity/plan/types';
import { marginOf } from '../../domain/activity/slotFigures';
import { obstaclesOf, obstacleWords, optionAt, wishById } from '../../domain/activity/timetable';
import { BAND_IDS, type BandId } from '../../domain/station/bands';
import { formatUtc } from '../../domain/time/format';
import { MINUTE_MS } from '../../domain/time/interval';
import type { Viewer } from '../auth/viewer';
import { inTransaction, type Tx } from '../db/transaction';
import { Conflict, NotFound } from '../errors';
import type { Services } from '../services';
import { requireEditor } from './access';
import { draftGround, planSlotOf, type DraftGround } from './draftGround';
import { newestRun } from './planRuns';
import { insertSlot, type StoredSlot } from './revisions';

const wishId = z
  .string('Name the wish by its id.')
  .min(1, 'Name the wish by its id.')
  .max(200, 'That is not the id of a wish.');

/** One change by hand. `place` puts a slot there, whether the wish had one or not. */
export const draftChangeSchema = z.object({
  version: z
    .number('Say which version of the draft you saw.')
    .int('Say which version of the draft you saw.'),
  change: z.discriminatedUnion(
    'kind',
    [
      z.object({
        kind: z.literal('place'),
        wishId,
        band: z.enum(BAND_IDS, 'Choose one of the bands.'),
        start: z.iso
          .datetime({ error: 'Give the time as 2027-01-20T22:00:00Z.' })
          .transform((text) => Date.parse(text)),
        pinned: z.boolean('Say whether the slot is fixed.').optional(),
      }),
      z.object({ kind: z.literal('remove'), wishId }),
      z.object({
        kind: z.literal('pin'),
        wishId,
        pinned: z.boolean('Say whether the slot is fixed.'),
      }),
    ],
    'Say place, remove or pin.',
  ),
});
type DraftChange = z.output<typeof draftChangeSchema>['change'];

/**
 * Changes the draft by hand: puts one slot somewhere else or into the plan, takes one out, or fixes it. A change after
 * which two slots would collide, a rest would be missing, or a station's Moon would not be there is refused in words, so
 * that a draft is right at any time. Returns the draft's next version and the figures of a slot that was put somewhere. Throws `NotFound`, `Forbidden`, or `Conflict`.
 */
export async function changeDraft(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
  { version, change }: z.output<typeof draftChangeSchema>,
): Promise<{ version: number; slot: { chance: number | null; marginDb: number | null } | null }> {
  return inTransaction(services.db, async (tx) => {
    const activity = await requireEditor(tx, viewer, slug);
    const run = await newestRun(tx, activity.id);
    if (run && run.ended_at === null) {
      throw new Conflict('A plan is being computed. Wait for it, or stop it first.');
    }
    const ground = await draftGround(tx, activity.id);
    const { row, slots } = ground.draft;
    if (row.version !== version) {
      throw new Conflict('The draft changed since you opened it. Reload the page.');
    }
    const wish = wishById(ground.problem, change.wishId);
    if (!wish) throw new NotFound('There is no such wish in this plan.');
    const present = slots.find((slot) => planSlotOf(slot).wishId === change.wishId);
    const nowMs = services.now();
    if (present && present.startMs <= nowMs) {
      throw new Conflict('This slot has begun, so it stays as it is.');
    }
    const slot = await apply(tx, ground, present, change, nowMs);
    await tx
      .updateTable('activity_revision')
      .set({ version: version + 1 })
      .where('id', '=', row.id)
      .execute();
    return { version: version + 1, slot };
  });
}

/** Returns the figures of the slot that was put somewhere, else null. */
async function apply(
  tx: Tx,
  ground: DraftGround,
  present: StoredSlot | undefined,
  change: DraftChange,
  nowMs: number,
): Promise<{ chance: number | null; marginDb: number | null } | null> {
  if (change.kind === 'place') {
    const placed = slotAt(ground, change, nowMs);
    const pinned = change.pinned ?? present?.pinned ?? false;
    if (present) await tx.deleteFrom('activity_slot').where('id', '=', present.id).execute();
    await insertSlot(tx, ground.draft.row.id, { ...placed, pinned });
    return { chance: placed.chance, marginDb: placed.marginDb };
  }
  if (!present) throw new Conflict('This wish has no slot in the plan.');
  if (change.kind === 'remove') {
    await tx.deleteFrom('activity_slot').where('id', '=', present.id).execute();
  } else {
    await tx
      .updateTable('activity_slot')
      .set({ pinned: change.pinned ? 1 : 0 })
      .where('id', '=', present.id)
      .execute();
  }
  return null;
}

/** The slot with its figures. Throws `Conflict` with everything that stands against it. */
function slotAt(
  { draft, problem, saved }: DraftGround,
  { wishId: id, band, start }: Extract<DraftChange, { kind: 'place' }>,
  nowMs: number,
): Omit<StoredSlot, 'id' | 'skedId' | 'pinned'> {
  const at: PlanSlot = { wishId: id, band, startMs: start };
  if (start <= nowMs) throw new Conflict('That time has passed.');
  const option = optionAt(problem, at);
  if (!option) {
    throw new Conflict(
      `No slot can begin ${formatUtc(start)}: the Moon, a limit or the hours of one of the two stand against it.`,
    );
  }
  const others = draft.slots.map(planSlotOf);
  const reasons = obstaclesOf(problem, others, at).map((one) => obstacleWords(problem, one));
  if (reasons.length > 0) throw new Conflict(reasons.join(' '), { reasons });
  const wish = wishById(problem, id)!;
  const priority = saved.input.wishes.find((one) => one.id === id)?.priority ?? wish.priority;
  return {
    stationA: problem.stations[wish.a]!.id,
    stationB: problem.stations[wish.b]!.id,
    band: band satisfies BandId,
    startMs: start,
    endMs: start + problem.slotMinutes * MINUTE_MS,
    priority,
    chance: option.chance,
    marginDb: marginOf(saved.input, at),
  };
}
