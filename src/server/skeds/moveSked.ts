import type { z } from 'zod';
import { DAY_MS } from '../../domain/time/interval';
import type { Viewer } from '../auth/viewer';
import type { SkedRow } from '../db/tables';
import type { Tx } from '../db/transaction';
import { Conflict, TooManyRequests } from '../errors';
import type { Services } from '../services';
import { changeSked, type ChangeOutcome } from './change';
import type { skedMoveSchema, WithLink } from './schemas';
import { requireMoon, slotWarnings } from './slotCheck';

/** Moves of one sked by one person within a day: every one of them mails the others. */
export const MOVES_A_DAY = 20;

/**
 * Offers another time for the sked; every other party has to answer again. An agreed slot is given up by it at once:
 * the booking is freed, everybody's calendar entry moves to the new time as tentative, and the mail says so. Throws as
 * `changeSked`, and `TooManyRequests`.
 */
export function moveSked(
  services: Services,
  viewer: Viewer,
  skedId: string,
  input: z.output<typeof skedMoveSchema> & WithLink,
): Promise<ChangeOutcome> {
  const slot = { startMs: input.start, endMs: input.end };
  return changeSked(services, viewer, {
    skedId,
    ...input,
    command: (by) => ({ kind: 'move', by, version: input.version, slot }),
    check: async (tx, { row, stations }) => {
      refuseInPlan(row);
      requireMoon(stations, slot);
      await requireFewMoves(tx, skedId, viewer.id, services.now());
      return slotWarnings(tx, stations, slot, skedId);
    },
  });
}

/** A slot of a plan is moved by its coordinator, who sees what it does to the others. */
function refuseInPlan(row: Pick<SkedRow, 'activity_id'>): void {
  if (row.activity_id !== null) {
    throw new Conflict(
      'This slot belongs to the plan of an activity. Give it back if you cannot keep it; its coordinator finds another.',
    );
  }
}

async function requireFewMoves(
  tx: Tx,
  skedId: string,
  personId: string,
  nowMs: number,
): Promise<void> {
  const { count, first } = await tx
    .selectFrom('sked_event')
    .select((select) => [
      select.fn.countAll<number>().as('count'),
      select.fn.min<number | null>('at').as('first'),
    ])
    .where('sked_id', '=', skedId)
    .where('person_id', '=', personId)
    .where('kind', '=', 'moved')
    .where('at', '>', nowMs - DAY_MS)
    .executeTakeFirstOrThrow();
  if (count < MOVES_A_DAY) return;
  throw new TooManyRequests(
    `You have moved this sked ${MOVES_A_DAY} times within a day, which is the most. Nothing was changed.`,
    Math.max(1, Math.ceil(((first ?? nowMs) + DAY_MS - nowMs) / 1000)),
  );
}
