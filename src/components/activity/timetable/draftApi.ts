import type { TimetableView } from '../../../domain/activity/timetableView';
import { paths } from '../../../paths';
import type { Change } from './model';

/** What the server refused, in its own words. */
export class Refused extends Error {}

async function call<T>(url: string, init?: RequestInit): Promise<T> {
  let response: Response;
  try {
    response = await fetch(url, { ...init, headers: { 'content-type': 'application/json' } });
  } catch {
    throw new Refused('The server could not be reached. Nothing was changed.');
  }
  const body = (await response.json()) as T & { error?: { message: string } };
  if (response.ok) return body;
  throw new Refused(body.error?.message ?? 'Something broke. Nothing was changed.');
}

export function fetchDraft(slug: string): Promise<TimetableView> {
  return call(paths.api.activityDraft(slug));
}

/** Sends one change. Throws `Refused`. */
export function sendChange(
  slug: string,
  version: number,
  change: Change,
): Promise<{ version: number; slot: { chance: number | null; marginDb: number | null } | null }> {
  const wire =
    change.kind === 'place'
      ? {
          kind: change.kind,
          wishId: change.wishId,
          band: change.band,
          start: new Date(change.startMs).toISOString(),
          pinned: change.pinned,
        }
      : change;
  return call(paths.api.activityDraft(slug), {
    method: 'POST',
    body: JSON.stringify({ version, change: wire }),
  });
}
