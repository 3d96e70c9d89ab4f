import { decide, type AnswerKind, type Sked, type SkedCommand } from '../../domain/sked/machine';
import { MINUTE_MS } from '../../domain/time/interval';
import type { SkedChoices, SkedReportView, SkedView } from '../../domain/sked/view';
import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';
import type { Services } from '../services';
import type { JudgedStation } from '../../domain/window/judge';
import { eventsOf } from './events';
import { judgedParties } from './judgedParties';
import { loadSked, stationIdsOf, type PartyStation } from './load';
import { noSuchSked } from './refusals';
import { slotWarnings } from './slotCheck';
import { summariesOf } from './summaries';

/**
 * The sked as a member of a party's crew sees it (also of one that dropped out), with its stations, and what to know before accepting while
 * it is offered. Throws `NotFound` for everybody else.
 */
export async function getSked(
  { db, now }: Services,
  viewer: Viewer,
  skedId: string,
): Promise<{
  view: SkedView;
  stations: PartyStation[];
  /** The same with their equipment on the band: parties see each other's, and it is on the public pages too. */
  judged: JudgedStation[];
  warnings: string[];
}> {
  const loaded = await loadSked(db, skedId);
  const mine = await stationIdsOf(db, viewer.id);
  const own = (loaded?.sked.parties ?? [])
    .map((party) => party.stationId)
    .filter((id) => mine.has(id));
  if (!loaded || own.length === 0) throw noSuchSked();
  const nowMs = now();
  const [summary] = await summariesOf(db, [loaded.row], mine, nowMs);
  const stations = summary!.parties.map((party) =>
    loaded.stations.find((station) => station.id === party.stationId)!,
  );
  return {
    stations,
    judged: await judgedParties(db, stations, loaded.row.band),
    warnings:
      summary!.state === 'offered' && !summary!.droppedOut
        ? await slotWarnings(db, loaded.stations, loaded.sked, skedId)
        : [],
    view: {
      ...summary!,
      events: await eventsOf(db, skedId, viewer.id),
      reports: await reportsOf(db, skedId),
      choices: {
        ...choicesFor(loaded.sked, own, nowMs),
        // Its coordinator moves the slots of a plan.
        ...(loaded.row.activity_id === null ? {} : { move: null }),
      },
    },
  };
}

/** Asks the state machine itself what would be taken, so that no button promises what would be refused. */
function choicesFor(sked: Sked, own: readonly string[], nowMs: number): SkedChoices {
  const { version } = sked;
  const first = (command: (by: string) => SkedCommand) =>
    own.find((by) => decide(sked, command(by), { nowMs }).ok) ?? null;
  const simple = (kind: AnswerKind) => first((by) => ({ kind, by, version }));
  const soonMs = Math.floor(nowMs / MINUTE_MS) * MINUTE_MS + 5 * MINUTE_MS;
  const elsewhere = {
    startMs: soonMs,
    endMs: soonMs + (sked.startMs === soonMs ? 45 : 40) * MINUTE_MS,
  };
  return {
    accept: simple('accept'),
    decline: simple('decline'),
    dropOut: simple('dropOut'),
    withdraw: simple('withdraw'),
    cancel: simple('cancel'),
    report: simple('report'),
    move: first((by) => ({ kind: 'move', by, version, slot: elsewhere })),
  };
}

async function reportsOf(db: Db, skedId: string): Promise<SkedReportView[]> {
  const rows = await db
    .selectFrom('sked_report')
    .innerJoin('station', 'station.id', 'sked_report.station_id')
    .select([
      'sked_report.station_id',
      'station.call_sign',
      'sked_report.result',
      'sked_report.report_sent',
      'sked_report.report_received',
      'sked_report.words',
      'sked_report.at',
    ])
    .where('sked_id', '=', skedId)
    .orderBy('sked_report.at')
    .execute();
  return rows.map((row) => ({
    stationId: row.station_id,
    callSign: row.call_sign,
    result: row.result,
    reportSent: row.report_sent,
    reportReceived: row.report_received,
    words: row.words,
    atMs: row.at,
  }));
}
