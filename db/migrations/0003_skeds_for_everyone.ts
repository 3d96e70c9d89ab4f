import { sql, type Kysely, type Migration } from 'kysely';

/**
 * Skeds with people who have no account, and what keeps a sked right until its result.
 *
 * `station.guest`: described by somebody who offered it a sked; its keeper has no confirmed account. Only the other
 * stations own their call sign, so the table is rebuilt without UNIQUE on the column (SQLite cannot drop it; the
 * migrator switches foreign keys off around all migrations and checks them before the commit).
 */
const statements = [
  `CREATE TABLE station_new (
    id TEXT PRIMARY KEY,
    call_sign TEXT NOT NULL CHECK (call_sign = upper(call_sign)),
    name TEXT NOT NULL,
    latitude_deg REAL NOT NULL CHECK (latitude_deg BETWEEN -90 AND 90),
    longitude_deg REAL NOT NULL CHECK (longitude_deg BETWEEN -180 AND 180),
    height_m REAL NOT NULL,
    locator TEXT NOT NULL,
    public_locator_length INTEGER NOT NULL CHECK (public_locator_length IN (2, 4, 6, 8, 10)),
    time_zone TEXT NOT NULL,
    sky_json TEXT NOT NULL CHECK (json_valid(sky_json)),
    hours_json TEXT NOT NULL CHECK (json_valid(hours_json)),
    listed INTEGER NOT NULL DEFAULT 1 CHECK (listed IN (0, 1)),
    guest INTEGER NOT NULL DEFAULT 0 CHECK (guest IN (0, 1)),
    note TEXT NOT NULL DEFAULT '',
    version INTEGER NOT NULL DEFAULT 1,
    created_at INTEGER NOT NULL,
    updated_at INTEGER NOT NULL,
    CHECK (guest = 0 OR listed = 0)
  ) STRICT`,
  `INSERT INTO station_new (id, call_sign, name, latitude_deg, longitude_deg, height_m, locator,
      public_locator_length, time_zone, sky_json, hours_json, listed, note, version, created_at, updated_at)
    SELECT id, call_sign, name, latitude_deg, longitude_deg, height_m, locator,
      public_locator_length, time_zone, sky_json, hours_json, listed, note, version, created_at, updated_at
    FROM station`,
  `DROP TABLE station`,
  `ALTER TABLE station_new RENAME TO station`,
  `CREATE UNIQUE INDEX station_by_own_call_sign ON station (call_sign) WHERE guest = 0`,
  `CREATE INDEX station_by_call_sign ON station (call_sign)`,

  `ALTER TABLE sked ADD COLUMN east_first INTEGER NOT NULL DEFAULT 1 CHECK (east_first IN (0, 1))`,
  `ALTER TABLE sked ADD COLUMN doppler_convention TEXT NOT NULL DEFAULT 'constantAtMoon'`,
  // Version at which the slot was agreed; reminders belong to it. Null while it is not.
  `ALTER TABLE sked ADD COLUMN agreed_version INTEGER`,
  `UPDATE sked SET agreed_version = version WHERE state IN ('agreed', 'reported')`,
  // Since when a party of three or more has no part in it any more.
  `ALTER TABLE sked_party ADD COLUMN left_at INTEGER`,
  `ALTER TABLE sked_report ADD COLUMN report_sent TEXT NOT NULL DEFAULT ''`,
  `ALTER TABLE sked_report ADD COLUMN report_received TEXT NOT NULL DEFAULT ''`,
  `CREATE TABLE sked_event_new (
    id TEXT PRIMARY KEY,
    sked_id TEXT NOT NULL REFERENCES sked (id) ON DELETE CASCADE,
    sked_version INTEGER NOT NULL,
    kind TEXT NOT NULL CHECK (kind IN
      ('offered', 'moved', 'accepted', 'agreed', 'declined', 'droppedOut', 'withdrawn', 'lapsed', 'cancelled',
       'reported')),
    station_id TEXT REFERENCES station (id),
    person_id TEXT REFERENCES person (id),
    start_at INTEGER NOT NULL,
    end_at INTEGER NOT NULL,
    words TEXT NOT NULL DEFAULT '',
    at INTEGER NOT NULL,
    -- SEQUENCE of the newest calendar message after it.
    sequence INTEGER NOT NULL DEFAULT 0
  ) STRICT`,
  `INSERT INTO sked_event_new SELECT *, 0 FROM sked_event`,
  `DROP TABLE sked_event`,
  `ALTER TABLE sked_event_new RENAME TO sked_event`,
  `CREATE INDEX sked_event_by_sked ON sked_event (sked_id, at)`,

  `CREATE TABLE sked_message (
    id TEXT PRIMARY KEY,
    sked_id TEXT NOT NULL REFERENCES sked (id) ON DELETE CASCADE,
    station_id TEXT NOT NULL REFERENCES station (id),
    person_id TEXT NOT NULL REFERENCES person (id),
    words TEXT NOT NULL,
    at INTEGER NOT NULL
  ) STRICT`,
  `CREATE INDEX sked_message_by_sked ON sked_message (sked_id, at)`,

  // The link in a mail to somebody without an account: one sked, one person.
  `CREATE TABLE guest_link (
    id TEXT PRIMARY KEY,
    token_hash TEXT NOT NULL UNIQUE,
    person_id TEXT NOT NULL REFERENCES person (id) ON DELETE CASCADE,
    sked_id TEXT REFERENCES sked (id) ON DELETE CASCADE,
    created_at INTEGER NOT NULL,
    expires_at INTEGER NOT NULL,
    used_at INTEGER
  ) STRICT`,
  `CREATE INDEX guest_link_by_person ON guest_link (person_id)`,
  // When somebody first offered a sked to somebody without an account: how many is limited.
  `CREATE TABLE guest_offer (
    by_person_id TEXT NOT NULL REFERENCES person (id) ON DELETE CASCADE,
    to_person_id TEXT NOT NULL REFERENCES person (id) ON DELETE CASCADE,
    first_at INTEGER NOT NULL,
    PRIMARY KEY (by_person_id, to_person_id)
  ) STRICT`,
  // Name and zone typed on registering, applied when the address is confirmed: until then anybody may have typed them.
  `ALTER TABLE person_token ADD COLUMN registration_json TEXT CHECK (json_valid(registration_json))`,
  // Addresses that want no mail from people they do not know.
  `CREATE TABLE mail_block (
    email TEXT PRIMARY KEY CHECK (email = lower(email)),
    at INTEGER NOT NULL
  ) STRICT`,

  // A row only for people who changed something; the defaults are in the domain.
  `CREATE TABLE mail_preference (
    person_id TEXT PRIMARY KEY REFERENCES person (id) ON DELETE CASCADE,
    preference_json TEXT NOT NULL CHECK (json_valid(preference_json)),
    updated_at INTEGER NOT NULL
  ) STRICT`,
  `CREATE TABLE digest_sent (
    person_id TEXT PRIMARY KEY REFERENCES person (id) ON DELETE CASCADE,
    at INTEGER NOT NULL
  ) STRICT`,
  `CREATE TABLE reminder (
    id TEXT PRIMARY KEY,
    sked_id TEXT NOT NULL REFERENCES sked (id) ON DELETE CASCADE,
    person_id TEXT NOT NULL REFERENCES person (id) ON DELETE CASCADE,
    kind TEXT NOT NULL CHECK (kind IN ('before', 'report')),
    minutes INTEGER NOT NULL CHECK (minutes >= 0),
    agreed_version INTEGER NOT NULL,
    due_at INTEGER NOT NULL,
    queued_at INTEGER,
    dropped_at INTEGER,
    UNIQUE (sked_id, person_id, kind, minutes, agreed_version)
  ) STRICT`,
  `CREATE INDEX reminder_due ON reminder (due_at) WHERE queued_at IS NULL AND dropped_at IS NULL`,

  `CREATE TABLE calendar_feed (
    id TEXT PRIMARY KEY,
    person_id TEXT NOT NULL REFERENCES person (id) ON DELETE CASCADE,
    station_id TEXT REFERENCES station (id) ON DELETE CASCADE,
    token_hash TEXT NOT NULL UNIQUE,
    created_at INTEGER NOT NULL,
    last_read_at INTEGER
  ) STRICT`,
  `CREATE INDEX calendar_feed_by_person ON calendar_feed (person_id)`,

  // Mails that came in, by Message-ID, so that one delivered twice counts once.
  `CREATE TABLE inbound_mail (
    message_id TEXT PRIMARY KEY,
    received_at INTEGER NOT NULL,
    outcome TEXT NOT NULL
  ) STRICT`,

  // Rebuilt, because the entries of a whole plan go out in one mail as PUBLISH (RFC 5546, 3.2.1).
  `CREATE TABLE outbox_new (
    id TEXT PRIMARY KEY,
    message_id TEXT NOT NULL UNIQUE,
    recipient TEXT NOT NULL,
    subject TEXT NOT NULL,
    text_body TEXT NOT NULL,
    html_body TEXT NOT NULL,
    calendar_method TEXT CHECK (calendar_method IN ('REQUEST', 'CANCEL', 'PUBLISH')),
    calendar_body TEXT,
    created_at INTEGER NOT NULL,
    next_attempt_at INTEGER NOT NULL,
    attempts INTEGER NOT NULL DEFAULT 0,
    leased_until INTEGER,
    sent_at INTEGER,
    set_aside_at INTEGER,
    last_error TEXT,
    topic TEXT NOT NULL DEFAULT 'account',
    person_id TEXT REFERENCES person (id) ON DELETE SET NULL,
    sked_id TEXT REFERENCES sked (id) ON DELETE SET NULL,
    reply_to TEXT,
    unsubscribe_url TEXT,
    -- Looked at once more when the mail leaves: a reminder of what is no longer so is dropped.
    reminder_id TEXT REFERENCES reminder (id) ON DELETE SET NULL,
    CHECK ((calendar_method IS NULL) = (calendar_body IS NULL))
  ) STRICT`,
  `INSERT INTO outbox_new (id, message_id, recipient, subject, text_body, html_body, calendar_method,
      calendar_body, created_at, next_attempt_at, attempts, leased_until, sent_at, set_aside_at, last_error)
    SELECT id, message_id, recipient, subject, text_body, html_body, calendar_method,
      calendar_body, created_at, next_attempt_at, attempts, leased_until, sent_at, set_aside_at, last_error
    FROM outbox`,
  `DROP TABLE outbox`,
  `ALTER TABLE outbox_new RENAME TO outbox`,
  `CREATE INDEX outbox_due ON outbox (next_attempt_at) WHERE sent_at IS NULL AND set_aside_at IS NULL`,
  `CREATE INDEX outbox_by_reply_to ON outbox (reply_to) WHERE reply_to IS NOT NULL`,
];

export const migration0003: Migration = {
  async up(db: Kysely<unknown>): Promise<void> {
    for (const statement of statements) {
      await sql.raw(statement).execute(db);
    }
  },
};
