import { sql, type Kysely, type Migration } from 'kysely';

/**
 * Activities: a roster of stations with their wishes, runs that compute a plan, and revisions of the plan with their
 * slots. A published slot is a sked of its own. "Over" is not stored: it is a published activity whose end has passed.
 */
const statements = [
  `CREATE TABLE activity (
    id TEXT PRIMARY KEY,
    slug TEXT NOT NULL UNIQUE,
    title TEXT NOT NULL,
    state TEXT NOT NULL CHECK (state IN ('collecting', 'planned', 'published')),
    coordinator_id TEXT NOT NULL REFERENCES person (id),
    start_at INTEGER NOT NULL,
    end_at INTEGER NOT NULL,
    slot_minutes INTEGER NOT NULL CHECK (slot_minutes BETWEEN 10 AND 240),
    grid_minutes INTEGER NOT NULL CHECK (grid_minutes BETWEEN 5 AND 120),
    band_change_minutes INTEGER NOT NULL CHECK (band_change_minutes >= 0),
    most_in_a_row INTEGER NOT NULL CHECK (most_in_a_row >= 1),
    least_pause_minutes INTEGER NOT NULL CHECK (least_pause_minutes >= 0),
    weights_json TEXT NOT NULL CHECK (json_valid(weights_json)),
    invitation TEXT NOT NULL DEFAULT '',
    notes TEXT NOT NULL DEFAULT '',
    answers_by INTEGER,
    version INTEGER NOT NULL DEFAULT 1,
    created_at INTEGER NOT NULL,
    updated_at INTEGER NOT NULL,
    CHECK (end_at > start_at)
  ) STRICT`,
  `CREATE INDEX activity_by_start ON activity (start_at)`,
  `CREATE TABLE activity_band (
    activity_id TEXT NOT NULL REFERENCES activity (id) ON DELETE CASCADE,
    band TEXT NOT NULL,
    frequency_mhz REAL NOT NULL,
    mode TEXT NOT NULL,
    PRIMARY KEY (activity_id, band)
  ) STRICT`,
  // bands_json and hours_json null: every band it has, its usable hours. hours_json: [[startMs, endMs], …].
  `CREATE TABLE activity_station (
    activity_id TEXT NOT NULL REFERENCES activity (id) ON DELETE CASCADE,
    station_id TEXT NOT NULL REFERENCES station (id),
    place INTEGER NOT NULL,
    answer TEXT NOT NULL CHECK (answer IN ('waiting', 'coming', 'notComing')),
    bands_json TEXT CHECK (json_valid(bands_json)),
    hours_json TEXT CHECK (json_valid(hours_json)),
    most_contacts INTEGER CHECK (most_contacts >= 1),
    wants TEXT NOT NULL DEFAULT 'everyone' CHECK (wants IN ('everyone', 'list')),
    priority INTEGER NOT NULL DEFAULT 2 CHECK (priority BETWEEN 1 AND 3),
    note TEXT NOT NULL DEFAULT '',
    invited_at INTEGER,
    reminded_at INTEGER,
    answered_at INTEGER,
    answered_by TEXT REFERENCES person (id) ON DELETE SET NULL,
    PRIMARY KEY (activity_id, station_id)
  ) STRICT`,
  `CREATE INDEX activity_station_by_station ON activity_station (station_id)`,
  `CREATE TABLE activity_wish (
    activity_id TEXT NOT NULL,
    station_id TEXT NOT NULL,
    partner_id TEXT NOT NULL REFERENCES station (id),
    kind TEXT NOT NULL CHECK (kind IN ('want', 'never')),
    priority INTEGER NOT NULL DEFAULT 2 CHECK (priority BETWEEN 1 AND 3),
    PRIMARY KEY (activity_id, station_id, partner_id),
    FOREIGN KEY (activity_id, station_id) REFERENCES activity_station (activity_id, station_id) ON DELETE CASCADE,
    CHECK (station_id <> partner_id)
  ) STRICT`,

  `CREATE TABLE plan_run (
    id TEXT PRIMARY KEY,
    activity_id TEXT NOT NULL REFERENCES activity (id) ON DELETE CASCADE,
    state TEXT NOT NULL CHECK (state IN ('queued', 'running', 'done', 'stopped', 'failed')),
    problem_json TEXT NOT NULL CHECK (json_valid(problem_json)),
    progress_json TEXT CHECK (json_valid(progress_json)),
    result_json TEXT CHECK (json_valid(result_json)),
    error TEXT,
    asked_by TEXT REFERENCES person (id) ON DELETE SET NULL,
    asked_at INTEGER NOT NULL,
    leased_until INTEGER,
    stop_asked_at INTEGER,
    ended_at INTEGER
  ) STRICT`,
  `CREATE INDEX plan_run_by_activity ON plan_run (activity_id, asked_at)`,
  `CREATE INDEX plan_run_open ON plan_run (asked_at) WHERE ended_at IS NULL`,
  `CREATE TABLE activity_revision (
    id TEXT PRIMARY KEY,
    activity_id TEXT NOT NULL REFERENCES activity (id) ON DELETE CASCADE,
    number INTEGER NOT NULL CHECK (number >= 1),
    state TEXT NOT NULL CHECK (state IN ('draft', 'published', 'replaced')),
    run_id TEXT REFERENCES plan_run (id) ON DELETE SET NULL,
    left_out_json TEXT NOT NULL DEFAULT '[]' CHECK (json_valid(left_out_json)),
    note TEXT NOT NULL DEFAULT '',
    version INTEGER NOT NULL DEFAULT 1,
    created_at INTEGER NOT NULL,
    published_at INTEGER,
    UNIQUE (activity_id, number)
  ) STRICT`,
  `CREATE UNIQUE INDEX activity_revision_one_draft ON activity_revision (activity_id) WHERE state = 'draft'`,
  `CREATE UNIQUE INDEX activity_revision_one_published ON activity_revision (activity_id)
    WHERE state = 'published'`,
  // station_a comes before station_b on the roster. sked_id: since it was published.
  `CREATE TABLE activity_slot (
    id TEXT PRIMARY KEY,
    revision_id TEXT NOT NULL REFERENCES activity_revision (id) ON DELETE CASCADE,
    station_a TEXT NOT NULL REFERENCES station (id),
    station_b TEXT NOT NULL REFERENCES station (id),
    band TEXT NOT NULL,
    start_at INTEGER NOT NULL,
    end_at INTEGER NOT NULL,
    pinned INTEGER NOT NULL DEFAULT 0 CHECK (pinned IN (0, 1)),
    priority INTEGER NOT NULL CHECK (priority BETWEEN 1 AND 3),
    chance REAL,
    margin_db REAL,
    sked_id TEXT REFERENCES sked (id),
    CHECK (end_at > start_at AND station_a <> station_b),
    UNIQUE (revision_id, station_a, station_b, band)
  ) STRICT`,
  `CREATE INDEX activity_slot_by_revision ON activity_slot (revision_id, start_at)`,
  `CREATE INDEX activity_slot_by_sked ON activity_slot (sked_id)`,

  `ALTER TABLE sked ADD COLUMN activity_id TEXT REFERENCES activity (id)`,
  `CREATE INDEX sked_by_activity ON sked (activity_id) WHERE activity_id IS NOT NULL`,
  `ALTER TABLE guest_link ADD COLUMN activity_id TEXT REFERENCES activity (id) ON DELETE CASCADE`,
  `ALTER TABLE outbox ADD COLUMN activity_id TEXT REFERENCES activity (id) ON DELETE SET NULL`,
];

export const migration0004: Migration = {
  async up(db: Kysely<unknown>): Promise<void> {
    for (const statement of statements) {
      await sql.raw(statement).execute(db);
    }
  },
};
