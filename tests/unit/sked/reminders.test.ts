import { describe, expect, it } from 'vitest';
import { DEFAULT_MAIL_PREFERENCE } from '~/domain/people/mailPreference';
import { isOfUse, newestOf, reminderTimes } from '~/domain/sked/reminders';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '~/domain/time/interval';

const slot = { startMs: Date.UTC(2027, 2, 28, 12), endMs: Date.UTC(2027, 2, 28, 13) };

describe('reminderTimes', () => {
  it('counts true time, whatever clocks are put forward in between', () => {
    const times = reminderTimes(slot, DEFAULT_MAIL_PREFERENCE);
    expect(times).toEqual([
      { kind: 'before', minutes: 1440, dueMs: Date.UTC(2027, 2, 27, 12) },
      { kind: 'before', minutes: 60, dueMs: Date.UTC(2027, 2, 28, 11) },
      { kind: 'report', minutes: 120, dueMs: Date.UTC(2027, 2, 28, 15) },
      { kind: 'report', minutes: 2880, dueMs: Date.UTC(2027, 2, 30, 13) },
    ]);
  });

  it('is empty when switched off, and only of the parts wished for', () => {
    const { topics } = DEFAULT_MAIL_PREFERENCE;
    const off = { ...DEFAULT_MAIL_PREFERENCE, topics: { ...topics, reminder: false } };
    expect(reminderTimes(slot, off)).toEqual([]);
    const none = { ...DEFAULT_MAIL_PREFERENCE, reminderMinutes: [], reportReminders: false };
    expect(reminderTimes(slot, none)).toEqual([]);
    const one = { ...none, reminderMinutes: [15] };
    expect(reminderTimes(slot, one).map(({ dueMs }) => slot.startMs - dueMs)).toEqual([
      15 * MINUTE_MS,
    ]);
  });
});

it('is of use before the start only, and a report for two days after it is due', () => {
  expect(isOfUse('before', 0, slot, slot.startMs - 1)).toBe(true);
  expect(isOfUse('before', 0, slot, slot.startMs)).toBe(false);
  const dueMs = slot.endMs + 2 * HOUR_MS;
  expect(isOfUse('report', dueMs, slot, dueMs + 2 * DAY_MS - 1)).toBe(true);
  expect(isOfUse('report', dueMs, slot, dueMs + 2 * DAY_MS)).toBe(false);
});

it('tells the newest of what fell due together', () => {
  const before = [1440, 15, 60].map((minutes) => ({ kind: 'before', minutes }) as const);
  expect(newestOf(before).minutes).toBe(15);
  const report = [120, 2880].map((minutes) => ({ kind: 'report', minutes }) as const);
  expect(newestOf(report).minutes).toBe(2880);
});
