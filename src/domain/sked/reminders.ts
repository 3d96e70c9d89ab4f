import type { MailPreference } from '../people/mailPreference';
import { DAY_MS, MINUTE_MS, type Interval } from '../time/interval';

export type ReminderKind = 'before' | 'report';

/** When a report that is due is asked for, in minutes after the end. */
export const REPORT_REMINDER_MINUTES: readonly number[] = [120, 2880];

/** A report is not asked for any more when the time for it passed so long ago. */
export const REPORT_LATEST_MS = 2 * DAY_MS;

export interface ReminderTime {
  kind: ReminderKind;
  /** Before the start, or after the end. */
  minutes: number;
  dueMs: number;
}

/** The reminders of one agreed sked for one person who wants mail of this kind, whatever the time is now. */
export function reminderTimes(
  slot: Interval,
  wish: Pick<MailPreference, 'topics' | 'reminderMinutes' | 'reportReminders'>,
): ReminderTime[] {
  if (!wish.topics.reminder) return [];
  const before = wish.reminderMinutes.map((minutes): ReminderTime => {
    return { kind: 'before', minutes, dueMs: slot.startMs - minutes * MINUTE_MS };
  });
  const after = (wish.reportReminders ? REPORT_REMINDER_MINUTES : []).map(
    (minutes): ReminderTime => {
      return { kind: 'report', minutes, dueMs: slot.endMs + minutes * MINUTE_MS };
    },
  );
  return [...before, ...after];
}

/** Whether a reminder makes sense at an instant: the start is ahead, or the report not long overdue. */
export function isOfUse(kind: ReminderKind, dueMs: number, slot: Interval, nowMs: number): boolean {
  return kind === 'before' ? slot.startMs > nowMs : nowMs - dueMs < REPORT_LATEST_MS;
}

/**
 * Of reminders of one kind that are due together (the worker was down for longer than lies between them) the one that
 * tells the newest; the others have nothing to add.
 */
export function newestOf<T extends Pick<ReminderTime, 'kind' | 'minutes'>>(due: readonly T[]): T {
  return due.reduce((best, one) => {
    const newer = one.kind === 'before' ? one.minutes < best.minutes : one.minutes > best.minutes;
    return newer ? one : best;
  });
}
