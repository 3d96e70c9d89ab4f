import { openDatabase } from '../../../src/server/db/connection';
import { inTransaction } from '../../../src/server/db/transaction';

/** Adds one, read first and written later, as often as asked; other processes do the same. */
const [file = '', rounds = '0'] = process.argv.slice(2);
const db = openDatabase(file);
for (let round = 0; round < Number(rounds); round += 1) {
  await inTransaction(db, async (tx) => {
    const { value } = await tx
      .selectFrom('installation')
      .select('value')
      .where('name', '=', 'counter')
      .executeTakeFirstOrThrow();
    await tx
      .updateTable('installation')
      .set({ value: String(Number(value) + 1) })
      .where('name', '=', 'counter')
      .execute();
  });
}
await db.destroy();
if (process.connected) process.disconnect();
