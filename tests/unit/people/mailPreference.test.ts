import { describe, expect, it } from 'vitest';
import { DEFAULT_MAIL_PREFERENCE, readMailPreference } from '~/domain/people/mailPreference';
import { mailPreferenceFormSchema } from '~/domain/people/mailPreferenceForm';

describe('readMailPreference', () => {
  it('completes what is stored from the defaults', () => {
    expect(readMailPreference({})).toEqual(DEFAULT_MAIL_PREFERENCE);
    expect(readMailPreference({ topics: { talk: false } }).topics).toEqual({
      reminder: true,
      digest: true,
      talk: false,
      activity: true,
    });
    expect(readMailPreference({ digest: { hour: 22 } }).digest).toEqual({
      rhythm: 'weekly',
      hour: 22,
      weekday: 1,
    });
    expect(readMailPreference({ reminderMinutes: [] }).reminderMinutes).toEqual([]);
  });

  it.each([null, 'text', [], { digest: { hour: 25 } }, { reminderMinutes: [7] }])(
    'falls back to the defaults for %j',
    (stored) => {
      expect(readMailPreference(stored)).toEqual(DEFAULT_MAIL_PREFERENCE);
    },
  );
});

describe('the form', () => {
  const sent = {
    'topic-reminder': 'on',
    'before-60': 'on',
    'before-10080': 'on',
    rhythm: 'daily',
    rhythmKept: 'weekly',
    hour: '0',
    weekday: '7',
  };

  it('takes a box that is not ticked for no', () => {
    expect(mailPreferenceFormSchema.parse(sent)).toEqual({
      topics: { reminder: true, digest: true, talk: false, activity: false },
      reminderMinutes: [10_080, 60],
      reportReminders: false,
      digest: { rhythm: 'daily', hour: 0, weekday: 7 },
    });
  });

  it('keeps how often the digest came when it is switched off', () => {
    const read = mailPreferenceFormSchema.parse({ ...sent, rhythm: 'off' });
    expect(read.topics.digest).toBe(false);
    expect(read.digest.rhythm).toBe('weekly');
  });

  it.each([
    [{ ...sent, hour: '24' }, 'Give the hour from 0 to 23.'],
    [{ ...sent, hour: '' }, 'Give the hour from 0 to 23.'],
    [{ ...sent, weekday: 'x' }, 'Choose a day of the week.'],
    [{ ...sent, rhythm: 'hourly' }, 'Choose every day or once a week.'],
  ])('refuses %j with a sentence', (form, sentence) => {
    const { error } = mailPreferenceFormSchema.safeParse(form);
    expect(error?.issues.map((issue) => issue.message)).toEqual([sentence]);
  });
});
