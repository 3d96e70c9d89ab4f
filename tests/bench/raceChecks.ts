import { sql } from 'kysely';
import type { Db } from '../../src/server/db/connection';

export interface RaceFindings {
  /** Pairs of bookings of one station that overlap, or of agreed skeds, whichever are more. */
  doubleBookings: number;
  agreed: number;
  /** Agreed skeds without the booking or the mail of a party, and bookings or mails of others. */
  incomplete: number;
  /** Skeds that were refused although nothing stood in their way. */
  refusedForNothing: number;
}

async function count(db: Db, query: ReturnType<typeof sql<{ n: number }>>): Promise<number> {
  return (await query.execute(db)).rows[0]!.n;
}

/** Looks at what the race left behind, with queries of its own. */
export async function inspectRace(db: Db): Promise<RaceFindings> {
  const bookings = await count(
    db,
    sql`SELECT count(*) AS n FROM booking a JOIN booking b
      ON a.station_id = b.station_id AND a.sked_id < b.sked_id
      AND a.start_at < b.end_at AND b.start_at < a.end_at`,
  );
  const skeds = await count(
    db,
    sql`WITH held AS (SELECT p.station_id, s.id, s.start_at, s.end_at
        FROM sked s JOIN sked_party p ON p.sked_id = s.id WHERE s.state = 'agreed')
      SELECT count(*) AS n FROM held a JOIN held b
      ON a.station_id = b.station_id AND a.id < b.id
      AND a.start_at < b.end_at AND b.start_at < a.end_at`,
  );
  const unbooked = await count(
    db,
    sql`SELECT count(*) AS n FROM sked s JOIN sked_party p ON p.sked_id = s.id
      LEFT JOIN booking b ON b.sked_id = s.id AND b.station_id = p.station_id
        AND b.start_at = s.start_at AND b.end_at = s.end_at
      WHERE (s.state = 'agreed') <> (b.sked_id IS NOT NULL)`,
  );
  const refusedForNothing = await count(
    db,
    sql`SELECT count(*) AS n FROM sked s WHERE s.state <> 'agreed' AND NOT EXISTS (
      SELECT 1 FROM sked_party p JOIN booking b ON b.station_id = p.station_id
      WHERE p.sked_id = s.id AND b.start_at < s.end_at AND s.start_at < b.end_at)`,
  );
  return {
    doubleBookings: Math.max(bookings, skeds),
    agreed: await count(db, sql`SELECT count(*) AS n FROM sked WHERE state = 'agreed'`),
    incomplete: unbooked + (await wrongMails(db)),
    refusedForNothing,
  };
}

/** Everybody in the crews of an agreed sked has one invitation to it, and nobody has any other. */
async function wrongMails(db: Db): Promise<number> {
  const due = await sql<{ mail: string }>`SELECT DISTINCT s.uid || ' ' || person.email AS mail
    FROM sked s JOIN sked_party p ON p.sked_id = s.id
    JOIN station_crew c ON c.station_id = p.station_id JOIN person ON person.id = c.person_id
    WHERE s.state = 'agreed'`.execute(db);
  const written = await db
    .selectFrom('outbox')
    .select(['recipient', 'calendar_body'])
    .where('calendar_method', '=', 'REQUEST')
    .execute();
  const missing = new Set(due.rows.map((row) => row.mail));
  let wrong = 0;
  for (const { recipient, calendar_body } of written) {
    const uid = /^UID:(.+?)\r?$/m.exec(calendar_body ?? '')?.[1];
    if (!missing.delete(`${uid} ${recipient}`)) wrong += 1;
  }
  return wrong + missing.size;
}
