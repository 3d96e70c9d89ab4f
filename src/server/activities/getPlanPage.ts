import type { RunView } from '../../domain/activity/run';
import type { ActivityView } from '../../domain/activity/views';
import { wishedPairs } from '../../domain/activity/wishes';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { requireEditor } from './access';
import { loadRoster } from './loadRoster';
import { newestRun, runView } from './planRuns';
import { activityView } from './records';
import { loadRevision } from './revisions';

export interface PlanPage {
  activity: ActivityView;
  coming: number;
  waiting: number;
  /** Pairs for which a contact is wished, and those of them with a band of both. */
  wishes: number;
  possible: number;
  run: RunView | null;
  draft: { number: number; slots: number; fixed: number; leftOut: number; atMs: number } | null;
  published: { number: number; slots: number } | null;
}

/** What a plan would be made of, the run under way, and what came of the last. Throws `NotFound` or `Forbidden`. */
export async function getPlanPage(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
): Promise<PlanPage> {
  const { db } = services;
  const row = await requireEditor(db, viewer, slug);
  const { stations, wishes } = await loadRoster(db, row);
  const pairs = wishedPairs(
    stations.map((station) => ({
      ...station,
      id: station.stationId,
      coming: station.answer === 'coming',
    })),
    wishes,
  );
  const run = await newestRun(db, row.id);
  const draft = await loadRevision(db, row.id, 'draft');
  const published = await loadRevision(db, row.id, 'published');
  return {
    activity: await activityView(db, row, services.now()),
    coming: stations.filter(({ answer }) => answer === 'coming').length,
    waiting: stations.filter(({ answer }) => answer === 'waiting').length,
    wishes: pairs.length,
    possible: pairs.filter(({ bands }) => bands.length > 0).length,
    run: run ? await runView(db, run) : null,
    draft: draft
      ? {
          number: draft.row.number,
          slots: draft.slots.length,
          fixed: draft.slots.filter(({ pinned }) => pinned).length,
          leftOut: (JSON.parse(draft.row.left_out_json) as unknown[]).length,
          atMs: draft.row.created_at,
        }
      : null,
    published: published ? { number: published.row.number, slots: published.slots.length } : null,
  };
}
