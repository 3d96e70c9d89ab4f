import type { z } from 'zod';
import type { Viewer } from '../auth/viewer';
import type { SkedRow } from '../db/tables';
import { Conflict } from '../errors';
import type { Services } from '../services';
import { changeSked, type ChangeOutcome } from './change';
import type { skedMoveSchema, WithLink } from './schemas';
import { requireMoon, slotWarnings } from './slotCheck';

/**
 * Offers another time for the sked; every other party has to answer again. An agreed slot is given up by it at once:
 * the booking is freed, everybody's calendar entry moves to the new time as tentative, and the mail says so. Throws as `changeSked`.
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
    check: (tx, { row, stations }) => {
      refuseInPlan(row);
      requireMoon(stations, slot);
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
