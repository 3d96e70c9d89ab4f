import { describe, expect, it } from 'vitest';
import {
  activitySettingsSchema,
  nestedFields,
  settingsProblems,
  type ActivitySettings,
} from '~/domain/activity/settings';
import { slugOf } from '~/domain/activity/slug';
import { stageOf } from '~/domain/activity/states';
import { DAY_MS } from '~/domain/time/interval';
import { FORM } from './form';

const START_MS = Date.UTC(2027, 1, 13);

function read(changes: Record<string, string> = {}): ActivitySettings {
  return activitySettingsSchema.parse(nestedFields({ ...FORM, ...changes }));
}

function refusal(changes: Record<string, string>): string[] {
  const parsed = activitySettingsSchema.safeParse(nestedFields({ ...FORM, ...changes }));
  if (!parsed.success) return parsed.error.issues.map(({ path }) => path.join('.'));
  return settingsProblems(parsed.data, START_MS - 30 * DAY_MS).map(({ path }) => path);
}

describe('the settings of an activity', () => {
  it('reads a form: times in UTC, chosen bands only, a comma as decimal point', () => {
    expect(read()).toMatchObject({
      startMs: START_MS,
      endMs: START_MS + 2 * DAY_MS,
      bands: [{ band: '432', frequencyMhz: 432.1, mode: 'q65-60b' }],
      answersByMs: null,
    });
    expect(refusal({})).toEqual([]);
  });

  it.each<[string, Record<string, string>]>([
    ['title', { title: '  ' }],
    ['title', { title: 'A<b>' }],
    ['start', { 'start.day': '2027-02-31' }],
    ['start', { 'start.day': '', 'start.clock': '' }],
    ['start', { 'start.clock': '24:10' }],
    ['end', { 'end.day': '2027-02-13' }],
    ['end', { 'end.day': '2027-02-21' }],
    ['slotMinutes', { slotMinutes: '45' }],
    ['slotMinutes', { slotMinutes: 'an hour' }],
    ['slotMinutes', { slotMinutes: '' }],
    ['gridMinutes', { gridMinutes: '7' }],
    ['bands', { 'bands.432.on': '' }],
    ['bands.432.frequencyMhz', { 'bands.432.frequencyMhz': '1296' }],
    ['bands.432.frequencyMhz', { 'bands.432.frequencyMhz': 'high' }],
    ['bands.432.mode', { 'bands.432.mode': 'semaphore' }],
    ['weights.favour', { 'weights.favour': 'me' }],
    ['answersBy', { 'answersBy.day': '2027-03-01' }],
  ])('refuses a wrong %s where it stands: %o', (path, changes) => {
    const [first = ''] = refusal(changes);
    // A box that is not ticked sends nothing; a wrong value is the list's problem.
    expect(first === path || first.startsWith(path)).toBe(true);
  });

  it('refuses an activity that lies in the past', () => {
    expect(settingsProblems(read(), START_MS + 3 * DAY_MS).map(({ path }) => path)).toEqual([
      'end',
    ]);
  });

  it('builds no prototype from names of fields', () => {
    nestedFields({ '__proto__.polluted': 'yes', 'constructor.prototype.polluted': 'yes' });
    expect(({} as Record<string, unknown>)['polluted']).toBeUndefined();
  });
});

describe('the address of an activity', () => {
  it.each([
    ['Northern winter weekend', 'northern-winter-weekend'],
    ['  Frühling & Été!  ', 'fruhling-ete'],
    ['月', 'activity'],
    ['New', 'activity'],
  ])('%s is %s', (title, slug) => {
    expect(slugOf(title)).toBe(slug);
  });
});

describe('the stage of an activity', () => {
  it('is over only when its plan was published', () => {
    expect(stageOf('published', 100, 99)).toBe('published');
    expect(stageOf('published', 100, 100)).toBe('over');
    expect(stageOf('planned', 100, 200)).toBe('planned');
  });
});
