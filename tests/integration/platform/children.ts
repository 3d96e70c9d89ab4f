import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';

export interface Ended {
  code: number | null;
  output: string;
}

/** Starts a TypeScript or plain file of ours in a process of its own, with a given environment. */
export function startChild(
  args: string[],
  env: Record<string, string | undefined>,
): { child: ChildProcess; ready: Promise<void>; ended: Promise<Ended> } {
  const child = spawn(process.execPath, args, {
    env: { PATH: process.env['PATH'], ...env },
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
  });
  let output = '';
  for (const stream of [child.stdout, child.stderr]) {
    stream?.on('data', (chunk: Buffer) => (output += chunk.toString()));
  }
  const ended = once(child, 'close').then(([code]) => ({ code: code as number | null, output }));
  const ready = new Promise<void>((resolve, reject) => {
    child.on('message', (report: { ready?: true; failed?: string }) => {
      if (report.ready) resolve();
      else reject(new Error(report.failed));
    });
    void ended.then(({ code }) => {
      reject(new Error(`ended with ${code} before it was ready: ${output}`));
    });
  });
  ready.catch(() => undefined);
  return { child, ready, ended };
}

/** Arguments that run a TypeScript file. */
export function typescript(file: string, ...args: string[]): string[] {
  return ['--import', 'tsx', file, ...args];
}
