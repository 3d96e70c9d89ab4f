import { z } from 'zod';
import { mailPreferenceSchema, REMINDER_CHOICES, type SwitchableTopic } from './mailPreference';

/** Names of the fields of the form; a box that is not ticked sends nothing. */
export const topicField = (topic: SwitchableTopic) => `topic-${topic}`;
export const minutesField = (minutes: number) => `before-${minutes}`;

const number = (text: string | undefined) => (text?.trim() ? Number(text) : NaN);

/** The form of the mail preferences, where every value is text and a missing box means no. */
export const mailPreferenceFormSchema = z
  .record(z.string(), z.string())
  .transform((form) => ({
    topics: {
      reminder: form[topicField('reminder')] === 'on',
      digest: form['rhythm'] !== 'off',
      talk: form[topicField('talk')] === 'on',
      activity: form[topicField('activity')] === 'on',
    },
    reminderMinutes: REMINDER_CHOICES.map(({ minutes }): number => minutes).filter(
      (minutes) => form[minutesField(minutes)] === 'on',
    ),
    reportReminders: form['reportReminders'] === 'on',
    digest: {
      rhythm: form['rhythm'] === 'off' ? form['rhythmKept'] : form['rhythm'],
      hour: number(form['hour']),
      weekday: number(form['weekday']),
    },
  }))
  .pipe(mailPreferenceSchema);
