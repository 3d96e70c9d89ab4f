import { ConfigurationMissing } from '../config';
import { DatabaseBroken } from '../db/connection';
import { MigrationFailed } from '../db/migrate';
import { log } from '../log';

/** What a child process tells the command that started it. */
export type Report = { ready: true; port?: number } | { failed: string };

/** Tells the parent, if there is one listening, that this process now does its work. */
export function reportReady(port?: number): void {
  process.send?.({ ready: true, ...(port === undefined ? {} : { port }) } satisfies Report);
}

const LONGEST_STOP_MS = 15_000;

/**
 * Runs `stop` once, on SIGTERM, on Ctrl-C or when the parent is gone, and ends the process with 0.
 * If that takes too long, ends it with 1.
 */
export function onStopRequest(stop: () => Promise<void>): void {
  let stopping = false;
  const handle = () => {
    if (stopping) return;
    stopping = true;
    setTimeout(() => process.exit(1), LONGEST_STOP_MS).unref();
    stop().then(
      () => process.exit(0),
      (error: unknown) => {
        log.error({ err: error }, 'stopping failed');
        process.exit(1);
      },
    );
  };
  process.on('SIGTERM', handle);
  process.on('SIGINT', handle);
  if (process.send) process.on('disconnect', handle);
}

/** Ends a process that cannot start: one sentence for known reasons, the whole error for a fault of ours. */
export function failToStart(error: unknown): void {
  const sentence = sentenceFor(error);
  if (!sentence) log.fatal({ err: error }, 'cannot start');
  const message = sentence ?? 'Echotide cannot start because of a fault of its own; see above.';
  if (process.send) {
    process.send({ failed: message } satisfies Report, () => process.exit(1));
  } else {
    process.stderr.write(`${message}\n`);
    process.exit(1);
  }
}

function sentenceFor(error: unknown): string | undefined {
  if (error instanceof ConfigurationMissing || error instanceof DatabaseBroken)
    return error.message;
  if (error instanceof MigrationFailed) return error.message;
  const { code, port, message, path, syscall } = error as NodeJS.ErrnoException & { port?: number };
  if (code === 'EADDRINUSE') return `Port ${port} is taken by another program.`;
  if (code === 'EADDRNOTAVAIL') return `HOST names an address that this machine does not have.`;
  if (code === 'EACCES' && port !== undefined) {
    return `Port ${port} needs more rights than this user has.`;
  }
  if (syscall === 'mkdir' || code === 'EACCES' || code === 'EROFS' || code === 'ENOSPC') {
    return `The folder ${path ?? 'for the data'} cannot be made or written to (${code}).`;
  }
  if (code?.startsWith('SQLITE_')) return `The database cannot be used: ${message} (${code}).`;
  return undefined;
}
