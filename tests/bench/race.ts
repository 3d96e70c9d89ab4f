import { fork, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import path from 'node:path';
import { seededRandom } from '../integration/mail/faultMoods';
import { NOW_MS } from '../integration/skeds/world';
import type { Outcome } from './raceChild';
import { inspectRace } from './raceChecks';
import { newRaceWorld, type Acceptance, type RaceWorld } from './raceWorld';
import type { Bench, BenchResult } from './results';

const ACCEPTANCES = 10_000;
const PROCESSES = 4;
/** Dealt out together and waited for, so that those who want the same time ask at the same time. */
const CHUNK = 200;

async function run(): Promise<BenchResult[]> {
  const preparedMs = performance.now();
  const world = await newRaceWorld(ACCEPTANCES, seededRandom(20_261_201));
  const processes = await Promise.all(Array.from({ length: PROCESSES }, () => start(world)));
  try {
    const begunMs = performance.now();
    console.log(`prepared in ${seconds(begunMs - preparedMs)}`);
    const outcomes = await race(world, processes);
    const tookMs = performance.now() - begunMs;
    return await report(world, outcomes, tookMs);
  } finally {
    for (const child of processes) {
      const ended = once(child, 'exit');
      child.send('end');
      await ended;
    }
    await world.close();
  }
}

async function start(world: RaceWorld): Promise<ChildProcess> {
  const child = fork(path.join(import.meta.dirname, 'raceChild.ts'), {
    execArgv: ['--import', 'tsx'],
    env: {
      ...process.env,
      PUBLIC_URL: world.services.config.publicUrl,
      DATA_DIR: world.folder,
      SMTP_HOST: '127.0.0.1',
      MAIL_FROM: 'mail@echotide.example',
      LOG_LEVEL: 'silent',
      RACE_NOW_MS: String(NOW_MS),
    },
  });
  await once(child, 'message');
  return child;
}

async function race(world: RaceWorld, processes: readonly ChildProcess[]): Promise<Outcome[]> {
  const outcomes: Outcome[] = [];
  for (let from = 0; from < world.acceptances.length; from += CHUNK) {
    const chunk = world.acceptances.slice(from, from + CHUNK);
    const given = processes.map(async (child, place) => {
      const batch: Acceptance[] = chunk.filter((_, index) => index % PROCESSES === place);
      const answered = once(child, 'message') as Promise<[Outcome[]]>;
      child.send(batch);
      outcomes.push(...(await answered)[0]);
    });
    await Promise.all(given);
  }
  return outcomes;
}

async function report(
  world: RaceWorld,
  outcomes: readonly Outcome[],
  tookMs: number,
): Promise<BenchResult[]> {
  const of = (kind: Outcome['kind']) => outcomes.filter((outcome) => outcome.kind === kind);
  const times = (kind: Outcome['kind']) => of(kind).map(({ ms }) => ms);
  const found = await inspectRace(world.services.db);
  const others = of('other');
  for (const words of new Set(others.map((outcome) => outcome.words))) console.log(words);
  console.table({
    agreed: { count: of('agreed').length, ...spread(times('agreed')) },
    conflict: { count: of('conflict').length, ...spread(times('conflict')) },
    other: { count: others.length },
  });
  console.log(
    `${seconds(tookMs)} for ${outcomes.length} acceptances, ${(tookMs / outcomes.length).toFixed(1)} ms each; ` +
      `${found.agreed} skeds agreed, ${found.incomplete} bookings or mails missing or too many, ` +
      `${found.refusedForNothing} refused for nothing`,
  );
  if (of('agreed').length !== found.agreed) throw new Error('Told more or fewer than were agreed.');
  const name = `skeds.race${ACCEPTANCES}`;
  const counts = `${found.agreed} agreed, ${of('conflict').length} refused as conflicts`;
  return [
    {
      name: `${name}.doubleBookings`,
      value: found.doubleBookings,
      unit: 'pairs',
      note: `${PROCESSES} processes on one file: ${counts}`,
    },
    {
      name: `${name}.otherOutcomes`,
      value: others.length + found.incomplete + found.refusedForNothing,
      unit: 'acceptances',
      note: 'neither agreed nor a conflict, or without a booking or mail, or refused for nothing',
    },
    {
      name: `${name}.ms`,
      value: tookMs / outcomes.length,
      unit: 'ms',
      note: `an acceptance, all processes together; ${spread(times('agreed'))['at most, ms']} ms the longest wait for a yes`,
    },
  ];
}

function spread(values: readonly number[]): Record<string, number> {
  const sorted = [...values].sort((a, b) => a - b);
  const at = (share: number) => Math.round(sorted[Math.ceil(share * sorted.length) - 1] ?? 0);
  return { 'median, ms': at(0.5), '99 %, ms': at(0.99), 'at most, ms': at(1) };
}

function seconds(ms: number): string {
  return `${(ms / 1000).toFixed(0)} s`;
}

export const race10000: Bench = { name: `skeds.race${ACCEPTANCES}`, run };
