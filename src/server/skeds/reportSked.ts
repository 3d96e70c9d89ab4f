import type { z } from 'zod';
import { disagreements, type SaidResult } from '../../domain/sked/result';
import { RESULT_WORDS } from '../../domain/sked/view';
import { DAY_MS } from '../../domain/time/interval';
import type { Viewer } from '../auth/viewer';
import type { Tx } from '../db/transaction';
import { TooManyRequests } from '../errors';
import type { Services } from '../services';
import { changeSked, type ChangeOutcome } from './change';
import { mailResult } from './mailResult';
import type { skedReportSchema, WithLink } from './schemas';

/** Reports of one station about one sked within a day: every one of them mails the others. */
const MOST_A_DAY = 20;

type Signals = 'reportSent' | 'reportReceived';
type Report = z.output<typeof skedReportSchema>;
/** Reports of the signal may be left away. */
export type ReportInput = Omit<Report, Signals> & Partial<Pick<Report, Signals>>;

/**
 * Says how the sked went for one station; a later report of the same station replaces it, and the history keeps both.
 * The other parties get a mail when something of it is new. Throws as `changeSked`, and `TooManyRequests`.
 */
export function reportSked(
  services: Services,
  viewer: Viewer,
  skedId: string,
  given: ReportInput & WithLink,
): Promise<ChangeOutcome> {
  const input: Report = { reportSent: '', reportReceived: '', ...given };
  return changeSked(services, viewer, {
    skedId,
    version: input.version,
    as: input.as,
    words: inWords(input),
    first: given.first,
    command: (by) => ({ kind: 'report', by, version: input.version }),
    also: async (tx, by) => {
      const atMs = services.now();
      await requireFew(tx, skedId, by, atMs);
      const before = await tx
        .selectFrom('sked_report')
        .selectAll()
        .where('sked_id', '=', skedId)
        .where('station_id', '=', by)
        .executeTakeFirst();
      const said = {
        person_id: viewer.id,
        result: input.result,
        report_sent: input.reportSent,
        report_received: input.reportReceived,
        words: input.words,
        at: atMs,
      };
      await tx
        .insertInto('sked_report')
        .values({ sked_id: skedId, station_id: by, ...said })
        .onConflict((conflict) => conflict.columns(['sked_id', 'station_id']).doUpdateSet(said))
        .execute();
      const same =
        before?.result === said.result &&
        before.report_sent === said.report_sent &&
        before.report_received === said.report_received &&
        before.words === said.words;
      if (same) return;
      const all = await saidOf(tx, skedId);
      await mailResult(tx, services, {
        skedId,
        stationId: by,
        personId: viewer.id,
        personName: viewer.name,
        words: input.words,
        corrected: before !== undefined,
        said: all,
        disagreements: disagreements(all),
      });
    },
  });
}

/** What the history keeps: "Completed, sent −21, received R−19. Slow fading." */
function inWords({ result, reportSent, reportReceived, words }: Report): string {
  const told = [
    RESULT_WORDS[result],
    ...(reportSent ? [`sent ${reportSent}`] : []),
    ...(reportReceived ? [`received ${reportReceived}`] : []),
  ].join(', ');
  return `${told.charAt(0).toUpperCase()}${told.slice(1)}. ${words}`.trim();
}

/** The results of a sked in the order in which they were first or last said. */
async function saidOf(tx: Tx, skedId: string): Promise<(SaidResult & { stationId: string })[]> {
  const rows = await tx
    .selectFrom('sked_report')
    .innerJoin('station', 'station.id', 'sked_report.station_id')
    .selectAll('sked_report')
    .select('station.call_sign')
    .where('sked_id', '=', skedId)
    .orderBy('at')
    .execute();
  return rows.map((row) => ({
    stationId: row.station_id,
    callSign: row.call_sign,
    result: row.result,
    reportSent: row.report_sent,
    reportReceived: row.report_received,
  }));
}

async function requireFew(tx: Tx, skedId: string, by: string, atMs: number): Promise<void> {
  const { count } = await tx
    .selectFrom('sked_event')
    .select((select) => select.fn.countAll<number>().as('count'))
    .where('sked_id', '=', skedId)
    .where('station_id', '=', by)
    .where('kind', '=', 'reported')
    .where('at', '>', atMs - DAY_MS)
    .executeTakeFirstOrThrow();
  // The event of this report is written already.
  if (count <= MOST_A_DAY) return;
  throw new TooManyRequests(
    `A station reports a sked at most ${MOST_A_DAY} times a day. Nothing was changed.`,
    DAY_MS / 1000,
  );
}
