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

/**
 * The reminders of one agreed sked for one person. `sinceMs`: since when all of it holds (the agreement, the place in
 * the crew, the preference); what would have been due by then is left out, because its moment was never there.
 */
export function reminderTimes(
  slot: Interval,
  preference: Pick<MailPreference, 'topics' | 'reminderMinutes' | 'reportReminders'>,
  sinceMs: number,
): ReminderTime[] {
  if (!preference.topics.reminder) return [];
  const before = preference.reminderMinutes.map((minutes): ReminderTime => ({
    kind: 'before',
    minutes,
    dueMs: slot.startMs - minutes * MINUTE_MS,
  }));
  const after = (preference.reportReminders ? REPORT_REMINDER_MINUTES : []).map(
    (minutes): ReminderTime => ({
      kind: 'report',
      minutes,
      dueMs: slot.endMs + minutes * MINUTE_MS,
    }),
  );
  return [...before, ...after].filter(({ dueMs }) => dueMs > sinceMs);
}

/** Whether a reminder that is due still makes sense: the start is ahead, or the report not long overdue. */
export function isStillOfUse(
  kind: ReminderKind,
  dueMs: number,
  slot: Interval,
  nowMs: number,
): boolean {
  return kind === 'before' ? slot.startMs > nowMs : nowMs - dueMs < REPORT_LATEST_MS;
}
