import { setMaxListeners } from 'node:events';
import { log } from '../log';

export interface Job {
  name: string;
  /** Pause between the end of one run and the start of the next. */
  everyMs: number;
  /** Resolving to true asks for the next run at once, because there is more to do. */
  run: () => Promise<boolean>;
}

/**
 * Runs each job in its own loop; a job that throws is logged and tried again at its next turn, and
 * never stops another one. The returned function ends the loops and resolves when the runs under way
 * are finished.
 */
export function startJobs(jobs: readonly Job[]): () => Promise<void> {
  const stopping = new AbortController();
  // Every loop that pauses listens to it.
  setMaxListeners(jobs.length + 1, stopping.signal);
  const loops = jobs.map((job) => loop(job, stopping.signal));
  return async () => {
    stopping.abort();
    await Promise.all(loops);
  };
}

async function loop(job: Job, stopping: AbortSignal): Promise<void> {
  while (!stopping.aborted) {
    const more = await runOnce(job);
    if (!more) await pause(job.everyMs, stopping);
  }
}

async function runOnce(job: Job): Promise<boolean> {
  try {
    return await job.run();
  } catch (error) {
    log.error({ job: job.name, err: error }, 'job failed');
    return false;
  }
}

function pause(ms: number, stopping: AbortSignal): Promise<void> {
  return new Promise((resolve) => {
    if (stopping.aborted) return resolve();
    const timer = setTimeout(done, ms);
    stopping.addEventListener('abort', done, { once: true });
    function done() {
      clearTimeout(timer);
      stopping.removeEventListener('abort', done);
      resolve();
    }
  });
}
