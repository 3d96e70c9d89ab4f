import { sql } from 'kysely';
import type { Services } from '../../../src/server/services';

interface Expected {
  key: string;
  /** Whether it must have a row; else it may have one that was made before the wish changed. */
  required: boolean;
}

/**
 * What is wrong with the reminders, in sentences; empty when they are what follows from skeds, crews and wishes. Worked
 * out from the tables alone, without the code it checks. Call it right after `keepReminders`.
 *
 * Before the start: agreed skeds ahead × crew of the parties still in × times wished for. After the end: the same
 * skeds × crew of parties without a report × 2 h and 2 d. Every reminder that was queued has exactly one mail.
 */
export async function wrongWithReminders(services: Services): Promise<string[]> {
  const nowMs = services.now();
  const expected = await expectedReminders(services, nowMs);
  const byKey = new Map(expected.map((one) => [one.key, one]));
  const rows = await services.db.selectFrom('reminder').selectAll().execute();
  const keyOf = (row: (typeof rows)[number]) =>
    [row.sked_id, row.person_id, row.kind, row.minutes, row.agreed_version].join(' ');
  const known = new Set(rows.map(keyOf));
  const mails = await services.db
    .selectFrom('outbox')
    .select(['reminder_id'])
    .where('reminder_id', 'is not', null)
    .execute();
  const mailsOf = (id: string) => mails.filter((mail) => mail.reminder_id === id).length;
  return [
    ...expected
      .filter(({ key, required }) => required && !known.has(key))
      .map(({ key }) => `missing: ${key}`),
    ...rows
      .filter((row) => row.queued_at === null && row.dropped_at === null && !byKey.has(keyOf(row)))
      .map((row) => `not wanted, but waiting: ${keyOf(row)}`),
    ...rows
      .filter((row) => mailsOf(row.id) !== (row.queued_at === null ? 0 : 1))
      .map((row) => `${mailsOf(row.id)} mails, queued ${row.queued_at}: ${keyOf(row)}`),
    ...(known.size === rows.length ? [] : ['two rows of one reminder']),
  ];
}

async function expectedReminders({ db }: Services, nowMs: number): Promise<Expected[]> {
  const { rows } = await sql<{
    sked: string;
    person: string;
    version: number;
    start_at: number;
    end_at: number;
    since: number;
    reported: number;
    open: number;
    wish: string | null;
  }>`
    SELECT s.id AS sked, p.id AS person, s.agreed_version AS version, s.start_at, s.end_at,
      max(min(c.added_at), coalesce(m.updated_at, 0), coalesce((
        SELECT max(e.at) FROM sked_event e WHERE e.sked_id = s.id AND e.kind = 'agreed'
      ), s.created_at)) AS since,
      s.state = 'reported' AS reported,
      sum(NOT EXISTS (
        SELECT 1 FROM sked_report r WHERE r.sked_id = s.id AND r.station_id = c.station_id
      )) AS open,
      m.preference_json AS wish
    FROM sked s
    JOIN sked_party q ON q.sked_id = s.id AND q.left_at IS NULL
    JOIN station t ON t.id = q.station_id
    JOIN station_crew c ON c.station_id = t.id
    JOIN person p ON p.id = c.person_id
    LEFT JOIN mail_preference m ON m.person_id = p.id
    WHERE s.agreed_version IS NOT NULL AND p.locked_at IS NULL
      AND (p.confirmed_at IS NOT NULL OR (t.guest = 1 AND c.crew_role = 'keeper'
        AND NOT EXISTS (SELECT 1 FROM mail_block b WHERE b.email = p.email)))
    GROUP BY s.id, p.id`.execute(db);
  return rows.flatMap((row) => {
    const wish = JSON.parse(row.wish ?? '{}') as {
      topics?: { reminder?: boolean };
      reminderMinutes?: number[];
      reportReminders?: boolean;
    };
    if (wish.topics?.reminder === false) return [];
    const since = Math.min(row.since, nowMs);
    const one = (kind: string, minutes: number, dueMs: number): Expected => ({
      key: [row.sked, row.person, kind, minutes, row.version].join(' '),
      required: dueMs > since,
    });
    const before =
      !row.reported && row.start_at > nowMs ? (wish.reminderMinutes ?? [1440, 60]) : [];
    const after = row.open > 0 && wish.reportReminders !== false ? [120, 2880] : [];
    return [
      ...before.map((minutes) => one('before', minutes, row.start_at - minutes * 60_000)),
      ...after
        .map((minutes) => ({ minutes, dueMs: row.end_at + minutes * 60_000 }))
        .filter(({ dueMs }) => nowMs - dueMs < 2 * 86_400_000)
        .map(({ minutes, dueMs }) => one('report', minutes, dueMs)),
    ];
  });
}
