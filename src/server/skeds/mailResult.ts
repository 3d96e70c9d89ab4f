import type { SaidResult } from '../../domain/sked/result';
import { paths } from '../../paths';
import type { Tx } from '../db/transaction';
import { resultMail } from '../mail/templates/resultMail';
import { skedFacts } from '../mail/templates/skedFacts';
import type { Services } from '../services';
import { crewsOfSkeds } from './crews';
import { loadSked } from './load';
import { sendSkedMail } from './sendSkedMail';

interface Reported {
  skedId: string;
  /** Which station reported, and who for it. */
  stationId: string;
  personId: string;
  personName: string;
  words: string;
  corrected: boolean;
  said: readonly (SaidResult & { stationId: string })[];
  disagreements: readonly string[];
}

/** Tells the crews of the other parties how the sked went, so that they can answer. */
export async function mailResult(tx: Tx, services: Services, reported: Reported): Promise<void> {
  const loaded = await loadSked(tx, reported.skedId);
  const said = reported.said.find((one) => one.stationId === reported.stationId);
  if (!loaded || !said) return;
  const { row, stations } = loaded;
  const slot = { startMs: row.start_at, endMs: row.end_at };
  const { words, personName, corrected } = reported;
  for (const member of (await crewsOfSkeds(tx, [row.id])).get(row.id) ?? []) {
    const { personId, stationIds } = member;
    if (personId === reported.personId || stationIds.includes(reported.stationId)) continue;
    const reportDue = stationIds.some((id) => !reported.said.some((one) => one.stationId === id));
    const path = reportDue ? paths.skedReport(row.id) : paths.sked(row.id);
    const url = services.config.publicUrl + path;
    const callSigns = stations
      .filter((station) => stationIds.includes(station.id))
      .map((station) => station.callSign);
    const facts = skedFacts(row, stations, slot, url);
    const letter = resultMail(
      facts,
      { ...said, words, personName, corrected },
      reported.disagreements,
      { timeZone: member.timeZone, callSigns, reportDue, url },
    );
    await sendSkedMail(tx, services, { sked: row, facts, recipient: member, ...letter });
  }
}
