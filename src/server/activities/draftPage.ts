import { diffRevisions, type RevisionDiff } from '../../domain/activity/revision';
import type { ActivityView } from '../../domain/activity/views';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { requireEditor } from './access';
import { activityView } from './records';
import { loadRevision, slotsInForce, type LoadedRevision, type StoredSlot } from './revisions';

export interface DraftPage {
  activity: ActivityView;
  draft: LoadedRevision | null;
  published: LoadedRevision | null;
  /** What publishing the draft would change; null without a draft. */
  diff: RevisionDiff<StoredSlot> | null;
  callSigns: Map<string, string>;
}

/** The draft of an activity beside what is published. Throws `NotFound` or `Forbidden`. */
export async function draftPage(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
): Promise<DraftPage> {
  const { db } = services;
  const row = await requireEditor(db, viewer, slug);
  const draft = await loadRevision(db, row.id, 'draft');
  const published = await loadRevision(db, row.id, 'published');
  const slots = [...(draft?.slots ?? []), ...(published?.slots ?? [])];
  const ids = [...new Set(slots.flatMap(({ stationA, stationB }) => [stationA, stationB]))];
  const stations =
    ids.length === 0
      ? []
      : await db.selectFrom('station').select(['id', 'call_sign']).where('id', 'in', ids).execute();
  return {
    activity: await activityView(db, row, services.now()),
    draft,
    published,
    diff: draft && diffRevisions(await slotsInForce(db, row.id), draft.slots),
    callSigns: new Map(stations.map(({ id, call_sign }) => [id, call_sign])),
  };
}
