import { readDataFiles } from '../server/config';
import { openDatabase } from '../server/db/connection';
import { inTransaction } from '../server/db/transaction';
import { findPersonByEmail } from '../server/people/findPerson';
import { loadDotEnv } from './lib/dotEnv.mjs';

/**
 * `npx tsx src/cli/makeAdministrator.ts name@station.example`: makes somebody who has registered and confirmed
 * the address an administrator. The first one is made so; administrators make others on the page for people.
 */
async function main(): Promise<void> {
  loadDotEnv();
  const email = process.argv[2]?.trim().toLowerCase();
  if (!email) throw new Error('Name the mail address of the person.');
  const db = openDatabase(readDataFiles(process.env).databaseFile);
  try {
    await inTransaction(db, async (tx) => {
      const person = await findPersonByEmail(tx, email);
      if (!person || person.confirmed_at === null) {
        throw new Error(`Nobody has registered and confirmed ${email}.`);
      }
      await tx
        .updateTable('person')
        .set({ role: 'administrator' })
        .where('id', '=', person.id)
        .execute();
      await tx
        .insertInto('audit')
        .values({
          at: Date.now(),
          person_id: null,
          action: 'person.role',
          subject: person.id,
          details_json: JSON.stringify({ from: person.role, to: 'administrator' }),
        })
        .execute();
    });
  } finally {
    await db.destroy();
  }
  console.log(`${email} is an administrator now.`);
}

main().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : String(error));
  process.exit(1);
});
