import { SWITCHABLE_TOPICS, type SwitchableTopic } from '../../domain/people/mailPreference';
import type { Db } from '../db/connection';
import type { OutboxRow } from '../db/tables';
import { inTransaction } from '../db/transaction';
import { log } from '../log';
import { mailPreferenceOf } from '../people/mailPreferences';
import type { Services } from '../services';
import { keyText, keyTextOfRow, wantedReminders } from './wantedReminders';

/**
 * The last look at a mail before it leaves: a reminder of what is no longer so, and a mail of a kind that was switched
 * off meanwhile, are set aside with the reason. True when this mail was.
 */
export async function dropOutdated(services: Services, mail: OutboxRow): Promise<boolean> {
  if (!isSwitchable(mail.topic)) return false;
  const nowMs = services.now();
  const reason = await whyOutdated(services.db, mail, mail.topic, nowMs);
  if (reason === null) return false;
  await inTransaction(services.db, async (tx) => {
    await tx
      .updateTable('outbox')
      .set({ set_aside_at: nowMs, leased_until: null, last_error: `Dropped: ${reason}` })
      .where('id', '=', mail.id)
      .where('sent_at', 'is', null)
      .execute();
    if (mail.reminder_id === null) return;
    await tx
      .updateTable('reminder')
      .set({ dropped_at: nowMs })
      .where('id', '=', mail.reminder_id)
      .execute();
  });
  log.info({ outboxId: mail.id, reason }, 'mail dropped');
  return true;
}

function isSwitchable(topic: string): topic is SwitchableTopic {
  return (SWITCHABLE_TOPICS as readonly string[]).includes(topic);
}

async function whyOutdated(
  db: Db,
  mail: OutboxRow,
  topic: SwitchableTopic,
  nowMs: number,
): Promise<string | null> {
  if (mail.person_id !== null && !(await mailPreferenceOf(db, mail.person_id)).topics[topic]) {
    return 'mails of this kind were switched off.';
  }
  return topic === 'reminder' ? whyNoReminder(db, mail.reminder_id, nowMs) : null;
}

async function whyNoReminder(db: Db, id: string | null, nowMs: number): Promise<string | null> {
  const row = await db
    .selectFrom('reminder')
    .innerJoin('sked', 'sked.id', 'reminder.sked_id')
    .selectAll('reminder')
    .select(['sked.agreed_version as agreed_now', 'sked.start_at'])
    .where('reminder.id', '=', id)
    .executeTakeFirst();
  if (!row) return 'what it reminded of is gone.';
  const key = keyTextOfRow(row);
  const wanted = await wantedReminders(db, nowMs, [row.sked_id]);
  if (wanted.some((reminder) => keyText(reminder) === key)) return null;
  if (row.agreed_now !== row.agreed_version) return 'the sked is no longer agreed at that time.';
  if (row.kind === 'before' && row.start_at <= nowMs) return 'its start has passed.';
  return 'the person left the crew, has reported, or does not want it any more.';
}
