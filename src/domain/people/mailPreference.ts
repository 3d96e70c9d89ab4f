import { z } from 'zod';

/** Kinds of mail that a person can switch off; mails about the account and about offers and answers always come. */
export const SWITCHABLE_TOPICS = ['reminder', 'digest', 'talk', 'activity'] as const;
export type SwitchableTopic = (typeof SWITCHABLE_TOPICS)[number];

export const TOPIC_NAMES: Record<SwitchableTopic, string> = {
  reminder: 'Reminders',
  digest: 'Digest',
  talk: 'Messages',
  activity: 'Activities',
};

/** What the mails of a topic are, as an object of "You get …". */
export const TOPIC_WORDS: Record<SwitchableTopic, string> = {
  reminder: 'reminders of your skeds and of reports that are due',
  digest: 'the digest of what waits for you',
  talk: 'messages of your sked partners',
  activity: 'mails about activities',
};

/** How long before the start a reminder can come, in minutes. */
export const REMINDER_CHOICES = [
  { minutes: 10_080, label: '7 days' },
  { minutes: 2880, label: '2 days' },
  { minutes: 1440, label: '1 day' },
  { minutes: 720, label: '12 hours' },
  { minutes: 180, label: '3 hours' },
  { minutes: 60, label: '1 hour' },
  { minutes: 15, label: '15 minutes' },
] as const;

const REMINDER_MINUTES: readonly number[] = REMINDER_CHOICES.map(({ minutes }) => minutes);

export const DIGEST_RHYTHMS = ['daily', 'weekly'] as const;

export const mailPreferenceSchema = z.object({
  topics: z.object({
    reminder: z.boolean('Say whether reminders may come.'),
    digest: z.boolean('Say whether the digest may come.'),
    talk: z.boolean('Say whether messages may come by mail.'),
    activity: z.boolean('Say whether mails about activities may come.'),
  }),
  reminderMinutes: z
    .array(
      z
        .number('Reminders come so many minutes before the start.')
        .refine(
          (minutes) => REMINDER_MINUTES.includes(minutes),
          'Choose one of the times offered.',
        ),
    )
    .max(REMINDER_MINUTES.length, 'Name each time once.')
    .transform((all) => REMINDER_MINUTES.filter((minutes) => all.includes(minutes))),
  /** Whether reports that are due are asked for. */
  reportReminders: z.boolean('Say whether to be reminded of reports.'),
  digest: z.object({
    rhythm: z.enum(DIGEST_RHYTHMS, 'Choose every day or once a week.'),
    hour: z
      .number('Give the hour from 0 to 23.')
      .int('Give the hour from 0 to 23.')
      .min(0, 'Give the hour from 0 to 23.')
      .max(23, 'Give the hour from 0 to 23.'),
    weekday: z
      .number('Choose a day of the week.')
      .int('Choose a day of the week.')
      .min(1, 'Choose a day of the week.')
      .max(7, 'Choose a day of the week.'),
  }),
});

/** Which mail a person wants. `digest.weekday`: 1 Monday … 7 Sunday, for the weekly one. */
export type MailPreference = z.output<typeof mailPreferenceSchema>;

/** For everybody who has changed nothing. */
export const DEFAULT_MAIL_PREFERENCE: MailPreference = {
  topics: { reminder: true, digest: true, talk: true, activity: true },
  reminderMinutes: [1440, 60],
  reportReminders: true,
  digest: { rhythm: 'weekly', hour: 7, weekday: 1 },
};

/** What is stored, completed from the defaults where it says nothing or something unknown. */
export function readMailPreference(stored: unknown): MailPreference {
  const given = isRecord(stored) ? stored : {};
  const merged = {
    ...DEFAULT_MAIL_PREFERENCE,
    ...given,
    topics: { ...DEFAULT_MAIL_PREFERENCE.topics, ...part(given['topics']) },
    digest: { ...DEFAULT_MAIL_PREFERENCE.digest, ...part(given['digest']) },
  };
  const parsed = mailPreferenceSchema.safeParse(merged);
  return parsed.success ? parsed.data : DEFAULT_MAIL_PREFERENCE;
}

function isRecord(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

function part(value: unknown): Record<string, unknown> {
  return isRecord(value) ? value : {};
}
