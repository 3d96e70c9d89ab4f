/** A process of its own with its own connection: makes the acceptances it is given, a few at a time. */
import { readConfig } from '../../src/server/config';
import { openDatabase } from '../../src/server/db/connection';
import { Conflict } from '../../src/server/errors';
import { acceptSked } from '../../src/server/skeds/acceptSked';
import type { Acceptance } from './raceWorld';

export interface Outcome {
  kind: 'agreed' | 'conflict' | 'other';
  ms: number;
  words: string;
}

const AT_ONCE = 4;
const config = readConfig(process.env);
const db = openDatabase(config.databaseFile);
const nowMs = Number(process.env['RACE_NOW_MS']);

process.on('message', (batch: Acceptance[] | 'end') => {
  if (batch === 'end') void db.destroy().then(() => process.disconnect());
  else void runAll(batch).then((outcomes) => process.send!(outcomes));
});
process.send!('ready');

async function runAll(batch: readonly Acceptance[]): Promise<Outcome[]> {
  const outcomes: Outcome[] = [];
  const waiting = [...batch];
  const lane = async () => {
    for (let next = waiting.shift(); next; next = waiting.shift())
      outcomes.push(await accept(next));
  };
  await Promise.all(Array.from({ length: AT_ONCE }, lane));
  return outcomes;
}

async function accept({ skedId, version, viewer }: Acceptance): Promise<Outcome> {
  const begunMs = performance.now();
  const outcome = (kind: Outcome['kind'], words: string) => ({
    kind,
    ms: performance.now() - begunMs,
    words,
  });
  try {
    await acceptSked({ db, config, now: () => nowMs }, viewer, skedId, { version, words: '' });
    return outcome('agreed', '');
  } catch (error) {
    return outcome(error instanceof Conflict ? 'conflict' : 'other', String(error));
  }
}
