import type { CompiledQuery, DatabaseConnection, QueryResult } from 'kysely';

const LONGEST_WAIT_MS = 30_000;
const SHORTEST_PAUSE_MS = 1;
const LONGEST_PAUSE_MS = 8;

/**
 * A connection that waits for the write lock of another process without stopping its own: SQLite itself would
 * sleep, with every request of this process, and look so seldom (ten times a second) that under load it gives up
 * before it finds the lock free. Only the first statement of a transaction can meet the lock.
 */
export class PatientConnection implements DatabaseConnection {
  readonly #inner: DatabaseConnection;

  /** `inner` must not wait by itself (busy_timeout = 0). */
  constructor(inner: DatabaseConnection) {
    this.#inner = inner;
  }

  async executeQuery<R>(query: CompiledQuery): Promise<QueryResult<R>> {
    const untilMs = performance.now() + LONGEST_WAIT_MS;
    for (;;) {
      try {
        return await this.#inner.executeQuery<R>(query);
      } catch (error) {
        if (!isBusy(error) || performance.now() > untilMs) throw error;
      }
      await pause();
    }
  }

  streamQuery<R>(query: CompiledQuery, chunkSize: number): AsyncIterableIterator<QueryResult<R>> {
    return this.#inner.streamQuery<R>(query, chunkSize);
  }
}

function isBusy(error: unknown): boolean {
  const { code } = error as { code?: unknown };
  return typeof code === 'string' && code.startsWith('SQLITE_BUSY');
}

/** Of random length, so that those who wait do not keep asking in step with the one who has the lock. */
function pause(): Promise<void> {
  const ms = SHORTEST_PAUSE_MS + Math.random() * (LONGEST_PAUSE_MS - SHORTEST_PAUSE_MS);
  return new Promise((resolve) => setTimeout(resolve, ms));
}
