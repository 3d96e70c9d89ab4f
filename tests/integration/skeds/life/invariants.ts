import { expect } from 'vitest';
import { overlaps } from '../../../../src/domain/time/interval';
import { SKED_STATES } from '../../../../src/domain/sked/types';
import { loadSked } from '../../../../src/server/skeds/load';
import { keepReminders } from '../../../../src/server/reminders/keepReminders';
import { takeIn, type Calendars } from '../calendarProgram';
import { wrongWithReminders } from '../remindersDue';
import type { Model, ModelSked } from './model';
import { readMails, type Real } from './real';

export type Invariant = (model: Readonly<Model>, real: Real) => Promise<void>;

/** Looked at after every step. */
export const INVARIANTS: Invariant[] = [
  skedsAreAsTheModelSays,
  oneAgreedSkedAtATime,
  oneUidAndRisingSequence,
  calendarsTellTheTruth,
  remindersFollow,
];

/** Reminders are of the agreed skeds ahead, for their crews, as they wish, and no others. */
async function remindersFollow(_model: Readonly<Model>, real: Real): Promise<void> {
  await keepReminders(real.world.services);
  expect(await wrongWithReminders(real.world.services)).toEqual([]);
}

async function skedsAreAsTheModelSays(model: Readonly<Model>, real: Real): Promise<void> {
  for (const [index, expected] of model.skeds.entries()) {
    const { row, sked } = (await loadSked(real.world.services.db, real.ids[index]!))!;
    const answers = sked.parties.filter((party) => !party.left);
    const told = {
      state: row.state,
      version: row.version,
      startMs: row.start_at,
      endMs: row.end_at,
      answers: Object.fromEntries(answers.map((party) => [party.callSign, party.answer])),
      left: sked.parties.filter((party) => party.left).map((party) => party.callSign),
    };
    expect(told).toEqual({
      state: expected.state,
      version: expected.version,
      startMs: expected.startMs,
      endMs: expected.endMs,
      answers: Object.fromEntries(expected.answers),
      left: told.left.filter((callSign) => expected.left.has(callSign)),
    });
    expect(told.left).toHaveLength(expected.left.size);
    expect(SKED_STATES).toContain(row.state);
    const stands = row.state === 'agreed' || row.state === 'reported';
    expect(row.agreed_version !== null).toBe(stands);
  }
}

async function oneAgreedSkedAtATime(model: Readonly<Model>, real: Real): Promise<void> {
  const bookings = await real.world.services.db.selectFrom('booking').selectAll().execute();
  const slots = bookings.map((row) => ({ ...row, startMs: row.start_at, endMs: row.end_at }));
  for (const one of slots) {
    const clashes = slots.filter(
      (other) => other !== one && other.station_id === one.station_id && overlaps(one, other),
    );
    expect(clashes).toEqual([]);
  }
  const due = model.skeds
    .filter((sked) => sked.state === 'agreed' || sked.state === 'reported')
    .reduce((sum, sked) => sum + sked.answers.size, 0);
  expect(bookings).toHaveLength(due);
}

async function oneUidAndRisingSequence(_model: Readonly<Model>, real: Real): Promise<void> {
  const rows = await real.world.services.db
    .selectFrom('sked')
    .select(['id', 'uid', 'sequence'])
    .execute();
  expect(new Set(rows.map((row) => row.uid)).size).toBe(rows.length);
  for (const { id, uid, sequence } of rows) {
    expect(uid).toBe(real.uids.get(id) ?? uid);
    real.uids.set(id, uid);
    expect(sequence).toBeGreaterThanOrEqual(real.sequences.get(id) ?? 0);
    real.sequences.set(id, sequence);
  }
  const before = real.messages.length;
  await readMails(real);
  const newest = new Map<string, number>();
  for (const [place, { recipient, entry }] of real.messages.entries()) {
    const key = `${recipient} ${entry.uid}`;
    if (place >= before) {
      expect(entry.sequence).toBeGreaterThan(newest.get(key) ?? -1);
      expect(entry.attendee).toBe(`mailto:${recipient}`);
    }
    newest.set(key, entry.sequence);
  }
}

async function calendarsTellTheTruth(model: Readonly<Model>, real: Real): Promise<void> {
  await readMails(real);
  for (const [index, sked] of model.skeds.entries()) {
    const uid = real.uids.get(real.ids[index]!)!;
    for (const [callSign, viewer] of Object.entries(real.world.people)) {
      const shown = real.calendars.get(viewer.email)?.get(uid);
      const answer = sked.answers.get(callSign);
      if (answer === undefined) expect(shown?.status ?? 'CANCELLED').toBe('CANCELLED');
      else expect(shown).toMatchObject(entryOf(sked, answer === 'waiting'));
    }
    // What is over, or has lapsed without a word, is left as it is when a crew changes.
    if (sked.endMs <= model.nowMs || (sked.state === 'offered' && sked.startMs <= model.nowMs))
      continue;
    for (const [name, viewer] of Object.entries(real.people)) {
      const shown = real.calendars.get(viewer.email)?.get(uid);
      const isIn = [...sked.answers.keys()].some((callSign) =>
        model.crews.get(callSign)!.has(name),
      );
      const { status, startMs, endMs } = entryOf(sked, false);
      if (isIn && status !== 'CANCELLED') expect(shown).toMatchObject({ status, startMs, endMs });
      else expect(shown?.status ?? 'CANCELLED').toBe('CANCELLED');
    }
  }
}

function entryOf(sked: ModelSked, waiting: boolean) {
  const { startMs, endMs } = sked;
  if (sked.state === 'agreed' || sked.state === 'reported') {
    return { status: 'CONFIRMED', startMs, endMs, partstat: 'ACCEPTED', rsvp: 'FALSE' };
  }
  if (sked.state !== 'offered') return { status: 'CANCELLED', startMs, endMs };
  const asked = waiting
    ? { partstat: 'NEEDS-ACTION', rsvp: 'TRUE' }
    : { partstat: 'ACCEPTED', rsvp: 'FALSE' };
  return { status: 'TENTATIVE', startMs, endMs, ...asked };
}

/** Mail overtakes mail: the calendars must show the same when all of it comes in backwards. */
export function sameBackwards(real: Real): void {
  const backwards: Calendars = new Map();
  for (const { recipient, entry } of [...real.messages].reverse())
    takeIn(backwards, recipient, entry);
  const plain = (calendars: Calendars) =>
    Object.fromEntries([...calendars].map(([who, own]) => [who, Object.fromEntries(own)]));
  expect(plain(backwards)).toEqual(plain(real.calendars));
}
