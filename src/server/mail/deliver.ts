import { sql } from 'kysely';
import type { Db } from '../db/connection';
import type { OutboxRow } from '../db/tables';
import { log } from '../log';
import { dropOutdated } from '../reminders/dropOutdated';
import type { Services } from '../services';
import { backoffMs } from './backoff';
import { NotTaken, type SendMail } from './transport';

export interface DeliverOptions {
  send: SendMail;
  /** How long a taken mail belongs to this worker; a worker that dies leaves it to the next after that. */
  leaseMs: number;
  /** Mails sent at the same time, and taken at once. */
  atOnce: number;
}

/**
 * Takes what is due from the outbox, hands it to the mail server and records the outcome.
 * Returns how many mails were tried. A mail is marked as sent only after the server took it: a crash in
 * between sends it a second time under the same Message-ID, never not at all.
 */
export async function deliverDue(services: Services, options: DeliverOptions): Promise<number> {
  const mails = await lease(services, options);
  await Promise.all(mails.map((mail) => deliver(services, options, mail)));
  return mails.length;
}

/** One conditional UPDATE, so that two workers never take the same mail. */
async function lease({ db, now }: Services, options: DeliverOptions): Promise<OutboxRow[]> {
  const at = now();
  return db
    .updateTable('outbox')
    .set({ leased_until: at + options.leaseMs, attempts: sql`attempts + 1` })
    .where('id', 'in', (from) =>
      from
        .selectFrom('outbox')
        .select('id')
        .where('sent_at', 'is', null)
        .where('set_aside_at', 'is', null)
        .where('next_attempt_at', '<=', at)
        .where((or) => or.or([or('leased_until', 'is', null), or('leased_until', '<=', at)]))
        .orderBy('next_attempt_at')
        .limit(options.atOnce),
    )
    .returningAll()
    .execute();
}

async function deliver(services: Services, options: DeliverOptions, mail: OutboxRow) {
  const { db, now } = services;
  if (await dropOutdated(services, mail)) return;
  try {
    await options.send(mail, AbortSignal.timeout(Math.round(options.leaseMs * 0.75)));
  } catch (error) {
    if (!(error instanceof NotTaken)) log.error({ outboxId: mail.id, err: error }, 'mail broke');
    const failure = error instanceof NotTaken ? error : new NotTaken(String(error), false);
    await recordFailure(services, mail, failure);
    return;
  }
  await update(db, mail, {
    sent_at: now(),
    set_aside_at: null,
    leased_until: null,
    last_error: null,
  });
  log.info({ outboxId: mail.id, attempts: mail.attempts }, 'mail sent');
}

/** Only while no later attempt has begun: what that one does counts. */
async function recordFailure(services: Services, mail: OutboxRow, failure: NotTaken) {
  const { db, config, now } = services;
  const at = now();
  if (failure.permanent) {
    await update(
      db,
      mail,
      { set_aside_at: at, leased_until: null, last_error: failure.reason },
      mail.attempts,
    );
    log.warn({ outboxId: mail.id, attempts: mail.attempts }, 'mail set aside');
    return;
  }
  const waitMs = backoffMs(mail.attempts, Math.random(), config.mailRetry);
  await update(
    db,
    mail,
    { next_attempt_at: at + waitMs, leased_until: null, last_error: failure.reason },
    mail.attempts,
  );
  log.warn({ outboxId: mail.id, attempts: mail.attempts, waitMs }, 'mail will be tried again');
}

/** A mail that another attempt has already brought through stays sent. */
async function update(
  db: Db,
  { id }: OutboxRow,
  set: Partial<OutboxRow>,
  attempt?: number,
): Promise<void> {
  let query = db.updateTable('outbox').set(set).where('id', '=', id).where('sent_at', 'is', null);
  if (attempt !== undefined) query = query.where('attempts', '=', attempt);
  await query.execute();
}
