import { sql } from 'kysely';
import { z } from 'zod';
import { SKED_STATES } from '../../domain/sked/types';
import type { SkedSummary } from '../../domain/sked/view';
import { BAND_IDS } from '../../domain/station/bands';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { stationIdsOf } from './load';
import { stationIdSchema } from './schemas';
import { summariesOf } from './summaries';

const PAGE_ROWS = 50;

export const skedFilterSchema = z.object({
  when: z.enum(['coming', 'past'], 'Say coming or past.').default('coming'),
  state: z.enum(SKED_STATES, 'That is not a state of a sked.').optional(),
  /** One of the viewer's own stations. */
  station: stationIdSchema.optional(),
  /** Beginning of a partner's call sign. */
  with: z
    .string()
    .trim()
    .max(16, 'A call sign has at most 16 characters.')
    .transform((text) => text.toUpperCase())
    .optional(),
  band: z.enum(BAND_IDS, 'That is not one of the bands.').optional(),
  after: z
    .string()
    .regex(/^\d{1,15}_[\w-]{1,64}$/, 'That is not the end of a page.')
    .optional(),
});
export type SkedFilter = z.output<typeof skedFilterSchema>;

export interface SkedPage {
  skeds: SkedSummary[];
  /** Hand in as `after` for the next page; null on the last. */
  next: string | null;
}

/**
 * The skeds of the viewer's stations: coming ones (not over yet) soonest first, past ones latest first. Pages by key,
 * so that a sked which comes in between is neither missed nor seen twice.
 */
export async function listSkeds(
  { db, now }: Services,
  viewer: Viewer,
  filter: SkedFilter,
): Promise<SkedPage> {
  const mine = await stationIdsOf(db, viewer.id);
  const own = filter.station ? [filter.station].filter((id) => mine.has(id)) : [...mine];
  if (own.length === 0) return { skeds: [], next: null };
  const nowMs = now();
  const coming = filter.when === 'coming';
  let query = db
    .selectFrom('sked')
    .selectAll()
    .where('id', 'in', (parties) =>
      parties.selectFrom('sked_party').select('sked_id').where('station_id', 'in', own),
    )
    .where('end_at', coming ? '>' : '<=', nowMs)
    .orderBy('start_at', coming ? 'asc' : 'desc')
    .orderBy('id', coming ? 'asc' : 'desc')
    .limit(PAGE_ROWS + 1);
  if (filter.band) query = query.where('band', '=', filter.band);
  if (filter.state === 'lapsed') {
    query = query.where((or) =>
      or.or([
        or('state', '=', 'lapsed'),
        or.and([or('state', '=', 'offered'), or('start_at', '<=', nowMs)]),
      ]),
    );
  } else if (filter.state) {
    query = query.where('state', '=', filter.state);
    if (filter.state === 'offered') query = query.where('start_at', '>', nowMs);
  }
  if (filter.with) {
    const beginning = filter.with;
    query = query.where('id', 'in', (parties) =>
      parties
        .selectFrom('sked_party')
        .innerJoin('station', 'station.id', 'sked_party.station_id')
        .select('sked_party.sked_id')
        .where(sql<boolean>`substr(station.call_sign, 1, length(${beginning})) = ${beginning}`)
        .where('station.id', 'not in', own),
    );
  }
  if (filter.after) {
    const [startMs, id] = filter.after.split('_') as [string, string];
    const key = sql<boolean>`(start_at, id) > (${Number(startMs)}, ${id})`;
    const before = sql<boolean>`(start_at, id) < (${Number(startMs)}, ${id})`;
    query = query.where(coming ? key : before);
  }
  const rows = await query.execute();
  const shown = rows.slice(0, PAGE_ROWS);
  const last = shown.at(-1);
  return {
    skeds: await summariesOf(db, shown, mine, nowMs),
    next: rows.length > PAGE_ROWS && last ? `${last.start_at}_${last.id}` : null,
  };
}
