import { spawn } from 'node:child_process';
import { Problem } from './problem.mjs';

const LONGEST_STOP_MS = 18_000;

/** The processes one command started: it waits for them, and when one ends all end. */
export class Children {
  #running = new Map();
  #stopping;
  #lost;

  constructor() {
    this.lost = new Promise((resolve) => (this.#lost = resolve));
  }

  /**
   * Starts a Node.js process and resolves when it reports that it is ready.
   * With `once` the process ends by itself after its work. Throws `Problem` when it cannot start.
   */
  start(name, args, { env = process.env, once = false, waitForReport = true } = {}) {
    const child = spawn(process.execPath, args, {
      env,
      stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
    });
    const ended = new Promise((resolve) => child.once('exit', resolve));
    this.#running.set(name, { child, ended });
    return new Promise((resolve, reject) => {
      let failure;
      let ready = !waitForReport;
      if (ready) resolve();
      child.on('message', (report) => {
        if (report.failed) failure = report.failed;
        if (report.ready) {
          ready = true;
          resolve();
        }
      });
      child.once('error', (error) =>
        reject(new Problem(`${name} cannot start: ${error.message}.`)),
      );
      child.once('exit', (code, signal) => {
        this.#running.delete(name);
        const how = signal ? `signal ${signal}` : `exit code ${code}`;
        const sentence = failure ?? `${name} ended unexpectedly (${how}).`;
        if (!ready) reject(new Problem(sentence));
        else if (!once && !this.#stopping) this.#lost(sentence);
      });
    });
  }

  /** Asks every process to end, waits for them, and kills what does not. */
  stop() {
    this.#stopping ??= this.#stop();
    return this.#stopping;
  }

  async #stop() {
    const all = [...this.#running.values()];
    for (const { child } of all) child.kill('SIGTERM');
    const kill = setTimeout(() => {
      for (const { child } of all) if (child.exitCode === null) child.kill('SIGKILL');
    }, LONGEST_STOP_MS);
    await Promise.all(all.map(({ ended }) => ended));
    clearTimeout(kill);
  }
}

/** Arguments that run a TypeScript file of ours. */
export function typescript(file, ...args) {
  return ['--import', 'tsx', file, ...args];
}

/** Resolves at the first SIGINT, SIGTERM or SIGHUP; later ones are swallowed while things end. */
export function stopRequest() {
  return new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, resolve);
  });
}

/**
 * Runs `setUp` and then stays until somebody asks to stop (exit code 0) or a process is lost (a
 * sentence, exit code 1). Whatever happens, also during `setUp`, every process is ended first.
 */
export async function superviseUntilStopped(setUp) {
  const children = new Children();
  const asked = stopRequest().then(() => 'asked');
  let exitCode = 0;
  try {
    const outcome = await Promise.race([asked, setUp(children)]);
    if (outcome !== 'asked') {
      const lost = await Promise.race([children.lost, asked]);
      if (lost !== 'asked') throw new Problem(`${lost} Echotide stops.`);
    }
  } catch (error) {
    console.error(error instanceof Problem ? error.message : error);
    exitCode = 1;
  }
  await children.stop();
  process.exit(exitCode);
}
