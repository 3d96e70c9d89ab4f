import type { SkedEventKind } from '../../domain/sked/types';
import type { SkedEventView } from '../../domain/sked/view';
import { formatUtcRange } from '../../domain/time/format';
import type { Db } from '../db/connection';
import type { Tx } from '../db/transaction';

/** The history of a sked in the order in which it happened. */
export async function eventsOf(
  db: Db | Tx,
  skedId: string,
  viewerId?: string,
): Promise<(SkedEventView & { sequence: number })[]> {
  const rows = await db
    .selectFrom('sked_event')
    .leftJoin('station', 'station.id', 'sked_event.station_id')
    .leftJoin('person', 'person.id', 'sked_event.person_id')
    .select([
      'sked_event.sked_version',
      'sked_event.kind',
      'sked_event.person_id',
      'sked_event.start_at',
      'sked_event.end_at',
      'sked_event.words',
      'sked_event.at',
      'sked_event.sequence',
      'station.call_sign',
      'person.name',
    ])
    .where('sked_event.sked_id', '=', skedId)
    .orderBy('sked_event.sked_version')
    .orderBy('sked_event.at')
    .execute();
  return rows
    .map((row) => ({
      version: row.sked_version,
      kind: row.kind,
      callSign: row.call_sign,
      personName: row.name,
      sequence: row.sequence,
      byViewer: viewerId !== undefined && row.person_id === viewerId,
      startMs: row.start_at,
      endMs: row.end_at,
      words: row.words,
      atMs: row.at,
    }))
    .sort(
      (a, b) => a.version - b.version || Number(a.kind === 'agreed') - Number(b.kind === 'agreed'),
    );
}

const VERBS: Record<SkedEventKind, string> = {
  offered: 'offered',
  moved: 'moved it to',
  accepted: 'accepted',
  agreed: 'Agreed:',
  declined: 'declined',
  droppedOut: 'dropped out of',
  withdrawn: 'withdrew',
  lapsed: 'Lapsed without agreement:',
  cancelled: 'cancelled',
  reported: 'reported',
};

/** "QB7TID moved it to Wed 20 Jan 22:00–22:45 UTC." */
export function eventSentence(event: SkedEventView): string {
  const verb = VERBS[event.kind];
  const who = event.callSign ? `${event.callSign} ` : '';
  return `${who}${verb} ${formatUtcRange(event)}.`;
}
