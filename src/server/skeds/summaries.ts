import { disagreements } from '../../domain/sked/result';
import { hasLapsed, stillIn } from '../../domain/sked/standing';
import type { SkedPartyView, SkedSummary } from '../../domain/sked/view';
import type { Db } from '../db/connection';
import type { SkedRow } from '../db/tables';
import type { Tx } from '../db/transaction';

/** Turns rows into what lists show, with the parties of all of them in one query. */
export async function summariesOf(
  db: Db | Tx,
  rows: readonly SkedRow[],
  mine: ReadonlySet<string>,
  nowMs: number,
): Promise<SkedSummary[]> {
  if (rows.length === 0) return [];
  const ids = rows.map((row) => row.id);
  const parties = await db
    .selectFrom('sked_party')
    .innerJoin('station', 'station.id', 'sked_party.station_id')
    .select([
      'sked_party.sked_id',
      'sked_party.station_id',
      'sked_party.answer',
      'sked_party.left_at',
      'station.call_sign',
      'station.time_zone',
    ])
    .where('sked_party.sked_id', 'in', ids)
    .orderBy('sked_party.place')
    .execute();
  const reports = await db
    .selectFrom('sked_report')
    .select(['sked_id', 'station_id', 'result', 'report_sent', 'report_received'])
    .where('sked_id', 'in', ids)
    .orderBy('at')
    .execute();
  const reported = new Set(reports.map((report) => `${report.sked_id} ${report.station_id}`));
  return rows.map((row) => {
    const all = parties
      .filter((party) => party.sked_id === row.id)
      .map((party) => ({
        stationId: party.station_id,
        callSign: party.call_sign,
        timeZone: party.time_zone,
        answer: party.answer,
        mine: mine.has(party.station_id),
        left: party.left_at !== null,
      }))
      .sort((a, b) => Number(b.mine) - Number(a.mine));
    const still = stillIn(all).map(viewOf);
    const left = all.filter((party) => party.left).map(viewOf);
    const said = reports
      .filter((report) => report.sked_id === row.id)
      .map((report) => ({
        callSign: all.find((party) => party.stationId === report.station_id)?.callSign ?? '',
        result: report.result,
        reportSent: report.report_sent,
        reportReceived: report.report_received,
      }));
    return {
      ...summaryOf(row, still, nowMs),
      leftParties: left,
      droppedOut: left.some((party) => party.mine) && !still.some((party) => party.mine),
      disagreements: disagreements(said),
      reportDue:
        (row.state === 'agreed' || row.state === 'reported') &&
        row.end_at <= nowMs &&
        still.some((party) => party.mine && !reported.has(`${row.id} ${party.stationId}`)),
    };
  });
}

function viewOf({ left: _, ...party }: SkedPartyView & { left: boolean }): SkedPartyView {
  return party;
}

function summaryOf(row: SkedRow, parties: SkedPartyView[], nowMs: number) {
  const lapsed = hasLapsed({ state: row.state, startMs: row.start_at }, nowMs);
  return {
    id: row.id,
    state: lapsed ? ('lapsed' as const) : row.state,
    version: row.version,
    band: row.band,
    frequencyMhz: row.frequency_mhz,
    mode: row.mode,
    offeredBy: row.offered_by,
    parties,
    startMs: row.start_at,
    endMs: row.end_at,
    waitsForViewer:
      row.state === 'offered' &&
      !lapsed &&
      parties.some((party) => party.mine && party.answer === 'waiting'),
  };
}
