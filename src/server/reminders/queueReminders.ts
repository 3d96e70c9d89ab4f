import { newestOf } from '../../domain/sked/reminders';
import { paths } from '../../paths';
import type { ReminderTable } from '../db/tables';
import { inTransaction, type Tx } from '../db/transaction';
import { enqueueMail } from '../mail/outbox';
import { switchableMail } from '../mail/switchable';
import { beforeMail, reportDueMail, type ReminderLinks } from '../mail/templates/reminderMail';
import { skedFacts } from '../mail/templates/skedFacts';
import type { Services } from '../services';
import { crewsOfSkeds, type CrewMember } from '../skeds/crews';
import { linkForRecipient } from '../skeds/linkForRecipient';
import { loadSked, type LoadedSked } from '../skeds/load';
import { keyText, keyTextOfRow, wantedReminders } from './wantedReminders';

const AT_ONCE = 100;

type Due = Pick<ReminderTable, 'sked_id' | 'person_id' | 'kind'>;

/**
 * Puts a mail into the outbox for every reminder that is due and still wanted, each in one transaction with the mark
 * that it is queued: killed in between, neither is there, and the next run makes both. Returns how many mails.
 */
export async function queueReminders(services: Services): Promise<number> {
  const due = await services.db
    .selectFrom('reminder')
    .select(['sked_id', 'person_id', 'kind'])
    .distinct()
    .where('queued_at', 'is', null)
    .where('dropped_at', 'is', null)
    .where('due_at', '<=', services.now())
    .orderBy('due_at')
    .limit(AT_ONCE)
    .execute();
  let queued = 0;
  for (const one of due) {
    if (await inTransaction(services.db, (tx) => queueOne(tx, services, one))) queued += 1;
  }
  return queued;
}

async function queueOne(tx: Tx, services: Services, due: Due): Promise<boolean> {
  const nowMs = services.now();
  const rows = await tx
    .selectFrom('reminder')
    .selectAll()
    .where('sked_id', '=', due.sked_id)
    .where('person_id', '=', due.person_id)
    .where('kind', '=', due.kind)
    .where('queued_at', 'is', null)
    .where('dropped_at', 'is', null)
    .where('due_at', '<=', nowMs)
    .execute();
  const wanted = new Set((await wantedReminders(tx, nowMs, [due.sked_id])).map(keyText));
  // What is not wanted now is left to keepReminders, which takes it away.
  const usable = rows.filter((row) => wanted.has(keyTextOfRow(row)));
  const loaded = await loadSked(tx, due.sked_id);
  const member = (await crewsOfSkeds(tx, [due.sked_id]))
    .get(due.sked_id)
    ?.find(({ personId }) => personId === due.person_id);
  if (usable.length === 0 || !loaded || !member) return false;
  const told = newestOf(usable);
  await mail(tx, services, loaded, member, told);
  for (const row of usable) {
    await tx
      .updateTable('reminder')
      .set(row === told ? { queued_at: nowMs } : { dropped_at: nowMs })
      .where('id', '=', row.id)
      .execute();
  }
  return true;
}

async function mail(
  tx: Tx,
  services: Services,
  { row, stations }: LoadedSked,
  member: CrewMember,
  reminder: { id: string; kind: ReminderTable['kind'] },
): Promise<void> {
  const links = await linksFor(tx, services, member, row);
  const slot = { startMs: row.start_at, endMs: row.end_at };
  const facts = skedFacts(row, stations, slot, links.account ? links.sked : links.answer);
  const callSignsOf = (ids: readonly string[]) =>
    stations.filter((station) => ids.includes(station.id)).map((station) => station.callSign);
  const reader = { timeZone: member.timeZone, callSigns: callSignsOf(member.stationIds) };
  const reports = await tx
    .selectFrom('sked_report')
    .select(['station_id', 'result'])
    .where('sked_id', '=', row.id)
    .execute();
  const missing = member.stationIds.filter(
    (id) => !reports.some((report) => report.station_id === id),
  );
  const letter =
    reminder.kind === 'before'
      ? beforeMail(facts, reader, links, services.now())
      : reportDueMail(
          facts,
          { ...reader, dueCallSigns: callSignsOf(missing) },
          links,
          reports.map(({ station_id, result }) => ({
            callSign: callSignsOf([station_id]).join(),
            result,
          })),
        );
  await enqueueMail(tx, services, {
    ...switchableMail(services.config, member, 'reminder', letter),
    skedId: row.id,
    reminderId: reminder.id,
  });
}

async function linksFor(
  tx: Tx,
  services: Services,
  member: CrewMember,
  row: LoadedSked['row'],
): Promise<ReminderLinks> {
  if (!member.account) {
    return { account: false, answer: await linkForRecipient(tx, services, member, row) };
  }
  const { publicUrl } = services.config;
  return {
    account: true,
    sked: publicUrl + paths.sked(row.id),
    sheet: publicUrl + paths.skedSheet(row.id),
    live: publicUrl + paths.live,
    report: publicUrl + paths.skedReport(row.id),
  };
}
