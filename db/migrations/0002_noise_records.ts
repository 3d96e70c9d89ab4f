import { sql, type Kysely, type Migration } from 'kysely';

/**
 * Measured noise of a station's bands. Only what was measured is kept, with the gain and the beam the antenna had
 * then; temperatures are computed from it when it is read. `measured_on` is a day in UTC, "2027-01-18".
 */
const statements = [
  `CREATE TABLE noise_record (
    id TEXT PRIMARY KEY,
    station_id TEXT NOT NULL REFERENCES station (id) ON DELETE CASCADE,
    band TEXT NOT NULL,
    measured_on TEXT NOT NULL CHECK (date(measured_on) IS measured_on),
    method TEXT NOT NULL CHECK (method IN ('hotCold', 'sun')),
    y_db REAL NOT NULL CHECK (y_db > 0),
    hot_k REAL,
    cold_k REAL,
    flux_sfu REAL CHECK (flux_sfu > 0),
    flux_at TEXT CHECK (flux_at IN ('10cm', 'band')),
    gain_dbi REAL,
    beamwidth_deg REAL CHECK (beamwidth_deg > 0),
    note TEXT NOT NULL DEFAULT '',
    recorded_by TEXT REFERENCES person (id) ON DELETE SET NULL,
    created_at INTEGER NOT NULL,
    CHECK (CASE method
      WHEN 'hotCold' THEN hot_k IS NOT NULL AND cold_k IS NOT NULL AND hot_k > cold_k AND cold_k >= 0
        AND flux_sfu IS NULL AND flux_at IS NULL AND gain_dbi IS NULL AND beamwidth_deg IS NULL
      ELSE hot_k IS NULL AND cold_k IS NULL
        AND flux_sfu IS NOT NULL AND flux_at IS NOT NULL AND gain_dbi IS NOT NULL
        AND beamwidth_deg IS NOT NULL
    END)
  ) STRICT`,
  `CREATE INDEX noise_record_by_station_band
    ON noise_record (station_id, band, measured_on, created_at)`,
];

export const migration0002: Migration = {
  async up(db: Kysely<unknown>): Promise<void> {
    for (const statement of statements) {
      await sql.raw(statement).execute(db);
    }
  },
};
