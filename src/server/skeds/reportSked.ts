import type { z } from 'zod';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { changeSked, type ChangeOutcome } from './change';
import type { skedReportSchema, WithLink } from './schemas';

/** Says how the sked went for one station; a later report of the same station replaces it. Throws as `changeSked`. */
export function reportSked(
  services: Services,
  viewer: Viewer,
  skedId: string,
  input: z.output<typeof skedReportSchema> & WithLink,
): Promise<ChangeOutcome> {
  return changeSked(services, viewer, {
    skedId,
    ...input,
    command: (by) => ({ kind: 'report', by, version: input.version }),
    also: async (tx, by) => {
      const said = {
        person_id: viewer.id,
        result: input.result,
        words: input.words,
        at: services.now(),
      };
      await tx
        .insertInto('sked_report')
        .values({ sked_id: skedId, station_id: by, ...said })
        .onConflict((conflict) => conflict.columns(['sked_id', 'station_id']).doUpdateSet(said))
        .execute();
    },
  });
}
