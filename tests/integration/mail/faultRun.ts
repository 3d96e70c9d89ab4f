import { sql } from 'kysely';
import { inTransaction } from '~/server/db/transaction';
import { enqueueMail } from '~/server/mail/outbox';
import { startChild } from '../platform/children';
import { openGround, type Ground } from '../platform/ground';
import { FaultLedger, type FaultFindings } from './faultLedger';
import { MOODS, pick, scriptFor, seededRandom, type Mood } from './faultMoods';
import { letter } from './letters';
import { STAGES, startSmtpFake, type Script, type SmtpFake, type Stage } from './smtpFake';

export interface FaultReport extends FaultFindings {
  seconds: number;
  kills: number;
  conversations: Record<Mood, number>;
  /** What SQLite says of the file after all those kills. */
  integrity: string;
}

const WARM_UP = './tests/integration/mail/warmWorker.ts';
const LEASE_MS = 1000;
const ROUND_MS = 250;
const LONGEST_ROUND_MS = 10_000;
const KILL_EVERY = 5;
/** When a worker is killed: before or after the answer at a stage, or at any moment of the round. */
type Trigger = { stage: Stage; when: 'at' | 'answered'; delayMs: number } | null;

/**
 * Mails go into the outbox all along while the mail server changes its mood every round and the worker is killed
 * in every fifth; at the end the server behaves, and what is in the outbox has to come out.
 */
export async function runFaults(rounds: number, seed: number): Promise<FaultReport> {
  const run = await FaultRun.begin(seed);
  try {
    for (let round = 0; round < rounds; round += 1) await run.round(round);
    return await run.finish();
  } finally {
    await run.end();
  }
}

class FaultRun {
  readonly #begunMs = Date.now();
  readonly #ledger = new FaultLedger();
  readonly #conversations = Object.fromEntries(MOODS.map((mood) => [mood, 0])) as Record<
    Mood,
    number
  >;
  readonly #random: () => number;
  #fake!: SmtpFake;
  #ground!: Ground;
  #worker!: ReturnType<typeof startChild>;
  #spare!: ReturnType<typeof startChild>;
  #mood: Mood = 'behaves';
  #deck: Mood[] = [];
  #trigger: Trigger = null;
  #killed = false;
  #written = 0;
  #closedMs = 0;

  private constructor(seed: number) {
    this.#random = seededRandom(seed);
  }

  static async begin(seed: number): Promise<FaultRun> {
    const run = new FaultRun(seed);
    run.#fake = await listenOutside(run.#random, () => run.#script());
    run.#ground = await openGround({
      SMTP_PORT: String(run.#fake.port),
      MAIL_LEASE_SECONDS: String(LEASE_MS / 1000),
      MAIL_RETRY_FIRST_SECONDS: '0.1',
      MAIL_RETRY_LONGEST_SECONDS: '0.5',
    });
    run.#spare = run.#warmUp();
    await run.#startWorker();
    return run;
  }

  /** The next worker, loaded but held back: starting takes seconds on a busy machine. */
  #warmUp(): ReturnType<typeof startChild> {
    const args = ['--import', WARM_UP, 'src/worker/main.ts'];
    return startChild(['--import', 'tsx', ...args], this.#ground.env);
  }

  async #startWorker(): Promise<void> {
    await within(this.#spare.ready, 60_000);
    this.#worker = this.#spare;
    this.#killed = false;
    this.#worker.child.send('go');
    this.#spare = this.#warmUp();
  }

  /** Only the worker that runs now, not the one after it. */
  #killAfter(ms: number): void {
    const worker = this.#worker;
    setTimeout(() => {
      if (this.#worker === worker) this.#kill();
    }, ms);
  }

  #kill(): void {
    if (this.#killed) return;
    this.#killed = true;
    this.#ledger.killedMs.push(Date.now());
    this.#worker.child.kill('SIGKILL');
  }

  /** The conversation of one connection, in the mood of the moment. */
  #script(): Script {
    const beganMs = Date.now();
    const mood = this.#mood;
    this.#conversations[mood] += 1;
    const { script, keeps } = scriptFor(mood, this.#random);
    let acceptance: ReturnType<FaultLedger['accept']> | undefined;
    const atStage = (when: 'at' | 'answered', stage: Stage) => {
      const trigger = this.#trigger;
      if (trigger?.stage !== stage || trigger.when !== when) return;
      this.#trigger = null;
      if (trigger.delayMs === 0) this.#kill();
      else this.#killAfter(trigger.delayMs);
    };
    return {
      ...script,
      taken: (source) => {
        if (keeps) acceptance = this.#ledger.accept(source, beganMs);
      },
      at: (stage) => {
        if (script[stage]?.startsWith('5')) this.#ledger.refusals += 1;
        atStage('at', stage);
      },
      answered: (stage) => {
        atStage('answered', stage);
      },
      quit: () => {
        if (acceptance) acceptance.heard = true;
      },
    };
  }

  async round(round: number): Promise<void> {
    const random = this.#random;
    if (this.#deck.length === 0) this.#deck = shuffled(MOODS, random);
    await this.#enter(this.#deck.pop()!);
    const kills = round % KILL_EVERY === KILL_EVERY - 1;
    const before = this.#fake.connections();
    const writing = this.#write(2 + Math.floor(random() * 3));
    if (kills) this.#arm();
    const begunMs = Date.now();
    const felt = async () =>
      this.#mood === 'refuses connections'
        ? await this.#countRefused()
        : this.#fake.connections() - before > 1;
    while (!this.#killed && Date.now() - begunMs < LONGEST_ROUND_MS) {
      if (Date.now() - begunMs > (kills ? 3 : 1) * ROUND_MS && (await felt())) break;
      await pause(10);
    }
    await writing;
    if (!kills) return;
    this.#trigger = null;
    this.#kill();
    await this.#worker.ended;
    await this.#startWorker();
  }

  #arm(): void {
    const random = this.#random;
    const delayMs = random() < 0.5 ? 0 : Math.floor(random() * 30);
    if (random() < 0.25 || this.#mood === 'refuses connections') {
      this.#killAfter(random() * 2 * ROUND_MS);
    } else {
      // The moments around the message matter most.
      const stage = random() < 0.5 ? 'message' : pick(random, STAGES);
      this.#trigger = { stage, when: random() < 0.5 ? 'at' : 'answered', delayMs };
    }
  }

  async #enter(mood: Mood): Promise<void> {
    if (this.#mood === 'refuses connections') await this.#fake.open();
    this.#mood = mood;
    if (mood !== 'refuses connections') return;
    await this.#fake.close();
    this.#closedMs = Date.now();
  }

  /** Nothing of a refused connection is seen here but what the worker wrote down. */
  async #countRefused(): Promise<boolean> {
    const rows = await this.#ground.db
      .selectFrom('outbox')
      .select('id')
      .where('last_error', 'like', '%ECONNREFUSED%')
      .where('next_attempt_at', '>', this.#closedMs + 100)
      .execute();
    this.#conversations['refuses connections'] += rows.length;
    return rows.length > 0;
  }

  /** Puts mails into the outbox, one transaction each; every seventh is rolled back. */
  async #write(count: number): Promise<void> {
    for (let n = 0; n < count; n += 1) {
      await pause(this.#random() * 60);
      this.#written += 1;
      const subject = `Mail ${this.#written} of the fault run`;
      const undo = this.#written % 7 === 0;
      if (undo) this.#ledger.undone.add(subject);
      await inTransaction(this.#ground.db, async (tx) => {
        await enqueueMail(tx, { ...this.#ground, now: Date.now }, letter({ subject }));
        if (undo) throw new Error('undone');
      }).catch((error: unknown) => {
        if (!undo) throw error;
      });
    }
  }

  async finish(): Promise<FaultReport> {
    await this.#enter('behaves');
    const { db } = this.#ground;
    const waiting = () =>
      db
        .selectFrom('outbox')
        .select('id')
        .where('sent_at', 'is', null)
        .where('set_aside_at', 'is', null)
        .execute();
    const untilMs = Date.now() + 60_000;
    while ((await waiting()).length > 0 && Date.now() < untilMs) await pause(100);
    const rows = await db.selectFrom('outbox').selectAll().execute();
    const integrity = await sql<{ integrity_check: string }>`PRAGMA integrity_check`.execute(db);
    return {
      ...this.#ledger.judge(rows),
      seconds: (Date.now() - this.#begunMs) / 1000,
      kills: this.#ledger.killedMs.length,
      conversations: this.#conversations,
      integrity: integrity.rows.map((row) => row.integrity_check).join('; '),
    };
  }

  async end(): Promise<void> {
    for (const { child, ended } of [this.#worker, this.#spare]) {
      child.kill('SIGKILL');
      await ended;
    }
    await this.#fake.stop();
    await this.#ground.end();
  }
}

/** Listens below the ports that the system hands out, so that nobody takes the port while it is closed. */
async function listenOutside(random: () => number, script: () => Script): Promise<SmtpFake> {
  for (let tries = 0; ; tries += 1) {
    const port = 20_000 + ((process.pid * 7 + Math.floor(random() * 12_000)) % 12_000);
    try {
      return await startSmtpFake(script, port);
    } catch (error) {
      if (tries > 50) throw error;
    }
  }
}

function shuffled<T>(from: readonly T[], random: () => number): T[] {
  const rest = [...from];
  return from.map(() => rest.splice(Math.floor(random() * rest.length), 1)[0]!);
}

function pause(ms: number): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, ms));
}

async function within<T>(work: Promise<T>, ms: number): Promise<T> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new Error(`not done within ${ms} ms`)), ms);
  });
  return Promise.race([work, late]).finally(() => clearTimeout(timer));
}
