import { sql, type Kysely, type Migration } from 'kysely';

/** Instants are INTEGER milliseconds since 1970-01-01T00:00:00Z; *_json columns hold checked JSON. */
const statements = [
  `CREATE TABLE person (
    id TEXT PRIMARY KEY,
    email TEXT NOT NULL UNIQUE CHECK (email = lower(email)),
    name TEXT NOT NULL,
    password_hash TEXT,
    role TEXT NOT NULL CHECK (role IN ('operator', 'coordinator', 'administrator')),
    time_zone TEXT NOT NULL,
    confirmed_at INTEGER,
    locked_at INTEGER,
    sessions_valid_from INTEGER NOT NULL,
    created_at INTEGER NOT NULL
  ) STRICT`,
  `CREATE TABLE person_token (
    id TEXT PRIMARY KEY,
    person_id TEXT NOT NULL REFERENCES person (id) ON DELETE CASCADE,
    purpose TEXT NOT NULL CHECK (purpose IN ('confirmMail', 'signIn', 'resetPassword')),
    token_hash TEXT NOT NULL UNIQUE,
    created_at INTEGER NOT NULL,
    expires_at INTEGER NOT NULL,
    used_at INTEGER
  ) STRICT`,
  `CREATE INDEX person_token_by_person ON person_token (person_id)`,
  `CREATE TABLE station (
    id TEXT PRIMARY KEY,
    call_sign TEXT NOT NULL UNIQUE CHECK (call_sign = upper(call_sign)),
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
    note TEXT NOT NULL DEFAULT '',
    version INTEGER NOT NULL DEFAULT 1,
    created_at INTEGER NOT NULL,
    updated_at INTEGER NOT NULL
  ) STRICT`,
  `CREATE TABLE station_band (
    station_id TEXT NOT NULL REFERENCES station (id) ON DELETE CASCADE,
    band TEXT NOT NULL,
    setup_json TEXT NOT NULL CHECK (json_valid(setup_json)),
    PRIMARY KEY (station_id, band)
  ) STRICT`,
  `CREATE TABLE station_crew (
    station_id TEXT NOT NULL REFERENCES station (id) ON DELETE CASCADE,
    person_id TEXT NOT NULL REFERENCES person (id) ON DELETE CASCADE,
    crew_role TEXT NOT NULL CHECK (crew_role IN ('keeper', 'operator')),
    added_at INTEGER NOT NULL,
    PRIMARY KEY (station_id, person_id)
  ) STRICT`,
  `CREATE INDEX station_crew_by_person ON station_crew (person_id)`,
  `CREATE TABLE crew_invitation (
    id TEXT PRIMARY KEY,
    station_id TEXT NOT NULL REFERENCES station (id) ON DELETE CASCADE,
    email TEXT NOT NULL,
    crew_role TEXT NOT NULL CHECK (crew_role IN ('keeper', 'operator')),
    token_hash TEXT NOT NULL UNIQUE,
    invited_by TEXT NOT NULL REFERENCES person (id) ON DELETE CASCADE,
    created_at INTEGER NOT NULL,
    expires_at INTEGER NOT NULL,
    accepted_at INTEGER
  ) STRICT`,
  `CREATE INDEX crew_invitation_by_station ON crew_invitation (station_id)`,
  `CREATE TABLE sked (
    id TEXT PRIMARY KEY,
    uid TEXT NOT NULL UNIQUE,
    sequence INTEGER NOT NULL DEFAULT 0,
    band TEXT NOT NULL,
    frequency_mhz REAL NOT NULL,
    mode TEXT NOT NULL,
    state TEXT NOT NULL CHECK (state IN
      ('offered', 'agreed', 'declined', 'withdrawn', 'lapsed', 'cancelled', 'reported')),
    version INTEGER NOT NULL DEFAULT 1,
    offered_by TEXT NOT NULL REFERENCES station (id),
    start_at INTEGER NOT NULL,
    end_at INTEGER NOT NULL,
    created_at INTEGER NOT NULL,
    updated_at INTEGER NOT NULL,
    CHECK (end_at > start_at)
  ) STRICT`,
  `CREATE INDEX sked_by_state_start ON sked (state, start_at)`,
  `CREATE TABLE sked_party (
    sked_id TEXT NOT NULL REFERENCES sked (id) ON DELETE CASCADE,
    station_id TEXT NOT NULL REFERENCES station (id),
    place INTEGER NOT NULL,
    answer TEXT NOT NULL CHECK (answer IN ('waiting', 'accepted', 'declined')),
    PRIMARY KEY (sked_id, station_id)
  ) STRICT`,
  `CREATE INDEX sked_party_by_station ON sked_party (station_id)`,
  `CREATE TABLE sked_event (
    id TEXT PRIMARY KEY,
    sked_id TEXT NOT NULL REFERENCES sked (id) ON DELETE CASCADE,
    sked_version INTEGER NOT NULL,
    kind TEXT NOT NULL CHECK (kind IN
      ('offered', 'moved', 'accepted', 'agreed', 'declined', 'withdrawn', 'lapsed', 'cancelled', 'reported')),
    station_id TEXT REFERENCES station (id),
    person_id TEXT REFERENCES person (id),
    start_at INTEGER NOT NULL,
    end_at INTEGER NOT NULL,
    words TEXT NOT NULL DEFAULT '',
    at INTEGER NOT NULL
  ) STRICT`,
  `CREATE INDEX sked_event_by_sked ON sked_event (sked_id, at)`,
  `CREATE TABLE sked_report (
    sked_id TEXT NOT NULL REFERENCES sked (id) ON DELETE CASCADE,
    station_id TEXT NOT NULL REFERENCES station (id),
    person_id TEXT NOT NULL REFERENCES person (id),
    result TEXT NOT NULL CHECK (result IN ('completed', 'partly', 'notHeard')),
    words TEXT NOT NULL DEFAULT '',
    at INTEGER NOT NULL,
    PRIMARY KEY (sked_id, station_id)
  ) STRICT`,
  `CREATE TABLE booking (
    station_id TEXT NOT NULL REFERENCES station (id),
    sked_id TEXT NOT NULL REFERENCES sked (id) ON DELETE CASCADE,
    start_at INTEGER NOT NULL,
    end_at INTEGER NOT NULL,
    PRIMARY KEY (station_id, sked_id),
    CHECK (end_at > start_at)
  ) STRICT`,
  `CREATE INDEX booking_by_station_start ON booking (station_id, start_at)`,
  `CREATE TRIGGER booking_no_overlap_insert BEFORE INSERT ON booking
  WHEN EXISTS (
    SELECT 1 FROM booking AS taken
    WHERE taken.station_id = NEW.station_id AND taken.sked_id <> NEW.sked_id
      AND taken.start_at < NEW.end_at AND NEW.start_at < taken.end_at)
  BEGIN SELECT RAISE(ABORT, 'doubleBooking'); END`,
  `CREATE TRIGGER booking_no_overlap_update BEFORE UPDATE ON booking
  WHEN EXISTS (
    SELECT 1 FROM booking AS taken
    WHERE taken.station_id = NEW.station_id AND taken.sked_id <> NEW.sked_id
      AND taken.start_at < NEW.end_at AND NEW.start_at < taken.end_at)
  BEGIN SELECT RAISE(ABORT, 'doubleBooking'); END`,
  `CREATE TABLE outbox (
    id TEXT PRIMARY KEY,
    message_id TEXT NOT NULL UNIQUE,
    recipient TEXT NOT NULL,
    subject TEXT NOT NULL,
    text_body TEXT NOT NULL,
    html_body TEXT NOT NULL,
    calendar_method TEXT CHECK (calendar_method IN ('REQUEST', 'CANCEL')),
    calendar_body TEXT,
    created_at INTEGER NOT NULL,
    next_attempt_at INTEGER NOT NULL,
    attempts INTEGER NOT NULL DEFAULT 0,
    leased_until INTEGER,
    sent_at INTEGER,
    set_aside_at INTEGER,
    last_error TEXT,
    CHECK ((calendar_method IS NULL) = (calendar_body IS NULL))
  ) STRICT`,
  `CREATE INDEX outbox_due ON outbox (next_attempt_at) WHERE sent_at IS NULL AND set_aside_at IS NULL`,
  `CREATE TABLE audit (
    id INTEGER PRIMARY KEY,
    at INTEGER NOT NULL,
    person_id TEXT,
    action TEXT NOT NULL,
    subject TEXT NOT NULL,
    details_json TEXT NOT NULL DEFAULT '{}' CHECK (json_valid(details_json))
  ) STRICT`,
  `CREATE TABLE installation (
    name TEXT PRIMARY KEY,
    value TEXT NOT NULL
  ) STRICT`,
];

export const migration0001: Migration = {
  async up(db: Kysely<unknown>): Promise<void> {
    for (const statement of statements) {
      await sql.raw(statement).execute(db);
    }
  },
};
