import type { OutboxRow } from '~/server/db/tables';

/** One time that the server took responsibility for a message. */
export interface Acceptance {
  beganMs: number;
  /** Whether the worker heard the 250: it said QUIT afterwards. */
  heard: boolean;
}

/** What was put in, what came out, and what that says. */
export class FaultLedger {
  readonly acceptances = new Map<string, Acceptance[]>();
  readonly killedMs: number[] = [];
  /** Mails whose transaction was rolled back, by subject. */
  readonly undone = new Set<string>();
  readonly undoneSeen: string[] = [];
  refusals = 0;

  accept(source: string, beganMs: number): Acceptance {
    const messageId = /^Message-ID: (\S+?)\r?$/m.exec(source)?.[1] ?? '(none)';
    const subject = /^Subject: (.+?)\r?$/m.exec(source)?.[1] ?? '';
    if (this.undone.has(subject)) this.undoneSeen.push(subject);
    const acceptance = { beganMs, heard: false };
    this.acceptances.set(messageId, [...(this.acceptances.get(messageId) ?? []), acceptance]);
    return acceptance;
  }

  judge(rows: readonly OutboxRow[]): FaultFindings {
    const known = new Set(rows.map((row) => row.message_id));
    const copies = [...this.acceptances.values()];
    return {
      mails: rows.length,
      sent: rows.filter((row) => row.sent_at !== null).length,
      setAside: rows.filter((row) => row.set_aside_at !== null).length,
      lost: rows.filter((row) => this.#isLost(row)).map(describe),
      strange: [...[...this.acceptances.keys()].filter((id) => !known.has(id)), ...this.undoneSeen],
      duplicates: copies.reduce((sum, times) => sum + times.length - 1, 0),
      unexplained: copies.flatMap((times) =>
        times.slice(0, -1).filter((time, index) => {
          return !this.#explains(time, times[index + 1]!.beganMs);
        }),
      ),
    };
  }

  /** Neither taken by the server and known to be, nor set aside with the server's own reason. */
  #isLost(row: OutboxRow): boolean {
    if (row.sent_at !== null) return !this.acceptances.has(row.message_id);
    return row.set_aside_at === null || !/\b55\d\b/.test(row.last_error ?? '');
  }

  /** Why the worker could not know that its mail was taken before it began anew. */
  #explains({ beganMs, heard }: Acceptance, againMs: number): boolean {
    const killed = this.killedMs.some((at) => at >= beganMs && at <= againMs);
    return !heard || killed;
  }
}

export interface FaultFindings {
  mails: number;
  sent: number;
  setAside: number;
  lost: string[];
  /** Messages that were never committed to the outbox. */
  strange: string[];
  duplicates: number;
  /** Copies of which the worker could have known that they were taken. */
  unexplained: Acceptance[];
}

function describe(row: OutboxRow): string {
  const { subject, attempts, sent_at, set_aside_at, leased_until, next_attempt_at, last_error } =
    row;
  return JSON.stringify({
    subject,
    attempts,
    sent_at,
    set_aside_at,
    leased_until,
    next_attempt_at,
    last_error,
  });
}
