import {
  readRosterRecords,
  type LineProblem,
  type RosterLine,
} from '../../domain/activity/rosterCsv';
import type { BandId } from '../../domain/station/bands';
import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';
import { inTransaction, type Tx } from '../db/transaction';
import { AppError, InvalidInput } from '../errors';
import { emailField } from '../people/fields';
import type { Services } from '../services';
import { requireEditor } from './access';
import { addToRoster, MOST_STATIONS } from './addToRoster';
import { addGuest } from './inviteGuest';
import { offeredBands } from './loadRoster';
import { mailRoster } from './mailRoster';
import { parseRosterCsv } from './parseRosterCsv';
import type { ActivityRow } from './records';

/** A line that can be put on the roster. */
export type ImportLine = RosterLine &
  ({ kind: 'registered'; stationId: string; name: string } | { kind: 'guest' });

export interface RosterPreview {
  lines: ImportLine[];
  /** In order of the lines. */
  problems: LineProblem[];
}

/** What a roster file would do; writes nothing. Throws `NotFound` or `Forbidden`. */
export async function previewRoster(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role'>,
  slug: string,
  text: string,
): Promise<RosterPreview> {
  return preview(services.db, await requireEditor(services.db, viewer, slug), text);
}

/**
 * Puts every right line of the file on the roster, at once, and writes to the stations that have not said whether they
 * are coming. Throws `InvalidInput` when no line is right, `NotFound` or `Forbidden`.
 */
export async function importRoster(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role' | 'email'>,
  slug: string,
  text: string,
): Promise<{ imported: number; asked: number }> {
  return inTransaction(services.db, async (tx) => {
    const activity = await requireEditor(tx, viewer, slug);
    const { lines, problems } = await preview(tx, activity, text);
    if (lines.length === 0) {
      throw new InvalidInput(problems[0]?.message ?? 'There is no station in the file.');
    }
    const offered = await offeredBands(tx, activity.id);
    const written: string[] = [];
    for (const line of lines) {
      const stationId = await add(tx, services, viewer, activity, line);
      if (line.coming === null) written.push(stationId);
      else await answerFor(tx, services, activity, viewer, stationId, line, offered);
    }
    await mailRoster(tx, services, activity, 'invitation', written);
    return { imported: lines.length, asked: written.length };
  });
}

async function add(
  tx: Tx,
  services: Services,
  viewer: Pick<Viewer, 'id' | 'email'>,
  activity: ActivityRow,
  line: ImportLine,
): Promise<string> {
  const entry = { bands: line.bands, mostContacts: line.mostContacts, note: line.note };
  try {
    if (line.kind === 'guest') {
      const { callSign, mail, locator } = line;
      const given = { callSign, email: mail!, locator: locator! };
      return await addGuest(tx, services, viewer, activity, given, entry);
    }
    const station = { id: line.stationId, callSign: line.callSign };
    await addToRoster(tx, services, activity, station, entry);
    return line.stationId;
  } catch (error) {
    if (!(error instanceof AppError)) throw error;
    throw new InvalidInput(`Line ${line.line}: ${error.message} Nothing was imported.`);
  }
}

/** What the file says of a station that has answered elsewhere. */
async function answerFor(
  tx: Tx,
  { now }: Services,
  activity: ActivityRow,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
  line: ImportLine,
  offered: readonly BandId[],
): Promise<void> {
  const bands = line.kind === 'guest' ? (line.bands ?? offered) : line.bands;
  await tx
    .updateTable('activity_station')
    .set({
      answer: line.coming ? 'coming' : 'notComing',
      bands_json: bands === null ? null : JSON.stringify(bands),
      answered_at: now(),
      answered_by: viewer.id,
    })
    .where('activity_id', '=', activity.id)
    .where('station_id', '=', stationId)
    .execute();
}

async function preview(db: Db | Tx, activity: ActivityRow, text: string): Promise<RosterPreview> {
  const records = parseRosterCsv(text);
  if (!Array.isArray(records)) return { lines: [], problems: [records] };
  const read = readRosterRecords(records, await offeredBands(db, activity.id));
  const problems = [...read.problems];
  const lines: ImportLine[] = [];
  const known = await registeredStations(
    db,
    read.lines.map(({ callSign }) => callSign),
  );
  const onRoster = await rosterCallSigns(db, activity.id);
  for (const line of read.lines) {
    const found = known.get(line.callSign);
    const message =
      (onRoster.has(line.callSign) ? `${line.callSign} is on the roster already.` : null) ??
      (found ? null : guestProblem(line)) ??
      (onRoster.size + lines.length >= MOST_STATIONS
        ? `A roster has at most ${MOST_STATIONS} stations.`
        : null);
    if (message) problems.push({ line: line.line, message });
    else if (found) lines.push({ ...line, kind: 'registered', ...found });
    else lines.push({ ...line, kind: 'guest' });
  }
  return { lines, problems: problems.sort((a, b) => a.line - b.line) };
}

/** What a station that is not registered lacks. */
function guestProblem({ callSign, mail, locator }: RosterLine): string | null {
  if (mail === null) {
    return `${callSign} is not among the listed stations, so its mail address is needed.`;
  }
  const parsed = emailField.safeParse(mail);
  if (!parsed.success) return parsed.error.issues[0]!.message;
  if (locator === null) {
    return `${callSign} is not among the listed stations, so its locator is needed.`;
  }
  return null;
}

async function registeredStations(
  db: Db | Tx,
  callSigns: readonly string[],
): Promise<Map<string, { stationId: string; name: string }>> {
  if (callSigns.length === 0) return new Map();
  const rows = await db
    .selectFrom('station')
    .select(['id', 'call_sign', 'name'])
    .where('call_sign', 'in', [...callSigns])
    .where('guest', '=', 0)
    .where('listed', '=', 1)
    .execute();
  return new Map(rows.map((row) => [row.call_sign, { stationId: row.id, name: row.name }]));
}

async function rosterCallSigns(db: Db | Tx, activityId: string): Promise<Set<string>> {
  const rows = await db
    .selectFrom('activity_station')
    .innerJoin('station', 'station.id', 'activity_station.station_id')
    .select('station.call_sign')
    .where('activity_id', '=', activityId)
    .execute();
  return new Set(rows.map((row) => row.call_sign));
}
