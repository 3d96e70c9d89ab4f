import { describe, expect, it } from 'vitest';
import { answerSchema } from '~/domain/activity/answer';
import { activityHours, intervalsOfHours } from '~/domain/activity/hours';
import { nestedFields } from '~/domain/activity/settings';
import { DAY_MS, HOUR_MS, MINUTE_MS } from '~/domain/time/interval';

const START_MS = Date.UTC(2027, 1, 13);
const span = { startMs: START_MS, endMs: START_MS + 2 * DAY_MS };
const at = (hour: number) => START_MS + hour * HOUR_MS;
const read = (fields: Record<string, string>) =>
  answerSchema(span, ['432', '1296']).safeParse(nestedFields(fields));

describe('an answer', () => {
  it('keeps the hours, bands and wishes that were marked', () => {
    const parsed = read({
      answer: 'coming',
      'bands.1296': 'yes',
      when: 'these',
      'hour.6': 'yes',
      'hour.7': 'yes',
      'hour.30': 'yes',
      'hour.4000': 'yes',
      mostContacts: ' 6 ',
      wants: 'everyone',
      priority: '1',
      'wish.x': '3',
      'wish.y': 'never',
      'wish.z': '',
      note: 'two operators',
    });
    expect(parsed.data).toEqual({
      answer: 'coming',
      bands: ['1296'],
      hours: [
        { startMs: at(6), endMs: at(8) },
        { startMs: at(30), endMs: at(31) },
      ],
      mostContacts: 6,
      wants: 'everyone',
      priority: 1,
      wishes: [
        { partnerId: 'x', kind: 'want', priority: 3 },
        { partnerId: 'y', kind: 'never', priority: 2 },
      ],
      note: 'two operators',
    });
  });

  it('is usable hours where hours are marked but not meant', () => {
    const parsed = read({ answer: 'coming', 'bands.432': 'yes', when: 'usual', 'hour.6': 'yes' });
    expect(parsed.data?.hours).toBeNull();
  });

  it.each<[string, Record<string, string>]>([
    ['answer', { answer: '' }],
    ['bands', { answer: 'coming' }],
    ['hour', { answer: 'coming', 'bands.432': 'yes', when: 'these' }],
    ['wants', { answer: 'coming', 'bands.432': 'yes', wants: 'list', 'wish.x': 'never' }],
    ['mostContacts', { answer: 'coming', 'bands.432': 'yes', mostContacts: '-1' }],
    ['mostContacts', { answer: 'coming', 'bands.432': 'yes', mostContacts: 'many' }],
    ['note', { answer: 'coming', 'bands.432': 'yes', note: 'x'.repeat(1001) }],
  ])('says where it is wrong: %s', (path, fields) => {
    expect(read(fields).error?.issues.map((issue) => issue.path[0])).toEqual([path]);
  });

  it('needs no more than the word when not coming', () => {
    expect(read({ answer: 'notComing' }).data).toMatchObject({ answer: 'notComing', bands: [] });
  });
});

describe('the hours of an activity', () => {
  it('are chosen where the whole hour is usable', () => {
    const usable = [{ startMs: at(5) + 30 * MINUTE_MS, endMs: at(8) }];
    const chosen = activityHours(span, usable).flatMap(({ hours }) =>
      hours.filter((hour) => hour.chosen).map((hour) => hour.at),
    );
    expect(chosen).toEqual([6, 7]);
  });

  it('cover the activity once, also when it begins and ends within an hour', () => {
    const odd = { startMs: at(1) + 20 * MINUTE_MS, endMs: at(27) + 10 * MINUTE_MS };
    const days = activityHours(odd, []);
    expect(days.map(({ dayMs }) => dayMs)).toEqual([START_MS, START_MS + DAY_MS]);
    const all = days.flatMap(({ hours }) => hours);
    expect(intervalsOfHours(odd, new Set(all.map((hour) => hour.at)))).toEqual([odd]);
  });
});
