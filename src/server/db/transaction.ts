import { AsyncLocalStorage } from 'node:async_hooks';
import { sql, type Kysely } from 'kysely';
import type { Db } from './connection';
import type { Tables } from './tables';

/** A handle inside a transaction. Same queries as `Db`, but it cannot be opened again. */
export type Tx = Kysely<Tables> & { readonly __transaction: true };

const inside = new AsyncLocalStorage<true>();

/**
 * Runs `work` in one BEGIN IMMEDIATE transaction on one connection: reads inside see no later writer,
 * and the write lock is taken before the first read. Rolls back when `work` throws.
 * Nesting throws: pass the `Tx` on instead. Never await the network inside.
 */
export async function inTransaction<T>(db: Db, work: (tx: Tx) => Promise<T>): Promise<T> {
  if (inside.getStore()) {
    throw new Error(
      'inTransaction() inside a transaction: pass the transaction handle on instead.',
    );
  }
  return inside.run(true, () =>
    db.connection().execute(async (connection) => {
      await sql`BEGIN IMMEDIATE`.execute(connection);
      try {
        const result = await work(connection as unknown as Tx);
        await sql`COMMIT`.execute(connection);
        return result;
      } catch (error) {
        await sql`ROLLBACK`.execute(connection).catch(() => undefined);
        throw error;
      }
    }),
  );
}
