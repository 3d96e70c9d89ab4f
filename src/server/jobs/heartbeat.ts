import type { Services } from '../services';

const NAME = 'workerSeenAt';

/** Notes that the background worker is alive. */
export async function beat({ db, now }: Services): Promise<void> {
  const value = String(now());
  await db
    .insertInto('installation')
    .values({ name: NAME, value })
    .onConflict((conflict) => conflict.column('name').doUpdateSet({ value }))
    .execute();
}

/** When the background worker was last alive, in milliseconds UTC, or null when it never ran. */
export async function workerSeenAt({ db }: Services): Promise<number | null> {
  const row = await db
    .selectFrom('installation')
    .select('value')
    .where('name', '=', NAME)
    .executeTakeFirst();
  return row ? Number(row.value) : null;
}
