import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { activitySettingsSchema, nestedFields } from '~/domain/activity/settings';
import { DAY_MS } from '~/domain/time/interval';
import { getActivity } from '~/server/activities/getActivity';
import { getAnswerPage } from '~/server/activities/getAnswerPage';
import { getWorkbench } from '~/server/activities/getWorkbench';
import { createActivity } from '~/server/activities/createActivity';
import { inviteGuest } from '~/server/activities/inviteGuest';
import { inviteStation } from '~/server/activities/inviteStation';
import { listActivities } from '~/server/activities/listActivities';
import { moveOnRoster } from '~/server/activities/moveOnRoster';
import { remindDueRosters, remindRoster } from '~/server/activities/remindRoster';
import { removeFromRoster } from '~/server/activities/removeFromRoster';
import { saveAnswer } from '~/server/activities/saveAnswer';
import { updateActivity } from '~/server/activities/updateActivity';
import { Conflict, Forbidden, InvalidInput, NotFound } from '~/server/errors';
import { FORM } from '../../unit/activity/form';
import { answerForm, begin, newActivityWorld, START_MS, type ActivityWorld } from './world';

let world: ActivityWorld;
let slug: string;
beforeEach(async () => {
  world = await newActivityWorld();
  ({ slug } = await begin(world));
});
afterEach(() => world.close());

const id = (callSign: string) => world.stationIds[callSign]!;
const invite = (callSign: string) => inviteStation(world.services, world.marit, slug, id(callSign));
const roster = async () => (await getWorkbench(world.services, world.marit, slug)).roster;
const settings = (changes: Record<string, string> = {}) =>
  activitySettingsSchema.parse(nestedFields({ ...FORM, ...changes }));
const GUEST = {
  callSign: 'QX7ARN',
  email: 'arno@qx7arn.example',
  locator: 'EM17',
  bands: { '1296': 'yes' },
} as const;

describe('beginning an activity', () => {
  it('is for coordinators and administrators', async () => {
    const { services, people, administrator } = world;
    await expect(createActivity(services, people['QA1LUN']!, settings())).rejects.toThrow(
      Forbidden,
    );
    await createActivity(services, administrator, settings());
  });

  it('gives activities of one title addresses of their own', async () => {
    expect(slug).toBe('northern-winter-weekend');
    expect((await begin(world)).slug).toBe('northern-winter-weekend-2');
    expect((await begin(world)).slug).toBe('northern-winter-weekend-3');
  });

  it('writes nothing when something does not fit', async () => {
    await expect(
      createActivity(world.services, world.marit, settings({ slotMinutes: '45' })),
    ).rejects.toThrow(InvalidInput);
    expect(await listActivities(world.services, world.marit)).toHaveLength(1);
  });
});

describe('who may see and change an activity', () => {
  it('hides one that is not published from everybody but its coordinator, administrators and invited crews', async () => {
    await invite('QA1LUN');
    const { services, people, marit, otherCoordinator, administrator } = world;
    for (const viewer of [null, people['stranger']!, people['QB7TID']!, otherCoordinator]) {
      await expect(getActivity(services, viewer, slug)).rejects.toThrow(NotFound);
      expect(await listActivities(services, viewer)).toEqual([]);
    }
    expect(await getActivity(services, people['QA1LUN']!, slug)).toMatchObject({ editor: false });
    expect(await getActivity(services, marit, slug)).toMatchObject({ editor: true });
    expect(await getActivity(services, administrator, slug)).toMatchObject({ editor: true });
    expect(await listActivities(services, people['QA1LUN']!)).toMatchObject([{ mine: 'waiting' }]);
  });

  it('is open to everybody once published, and still nobody else changes it', async () => {
    const { services, people, otherCoordinator, stationIds } = world;
    await services.db.updateTable('activity').set({ state: 'published' }).execute();
    for (const viewer of [null, people['stranger']!, otherCoordinator]) {
      expect(await getActivity(services, viewer, slug)).toMatchObject({ editor: false });
    }
    for (const viewer of [people['stranger']!, otherCoordinator]) {
      const acts = [
        () => getWorkbench(services, viewer, slug),
        () => updateActivity(services, viewer, slug, 1, settings()),
        () => inviteStation(services, viewer, slug, stationIds['QA1LUN']!),
        () => inviteGuest(services, viewer, slug, GUEST),
        () => removeFromRoster(services, viewer, slug, stationIds['QA1LUN']!),
        () => moveOnRoster(services, viewer, slug, stationIds['QA1LUN']!, 1),
        () => remindRoster(services, viewer, slug),
      ];
      for (const act of acts) await expect(act()).rejects.toThrow(Forbidden);
    }
    expect(await roster()).toEqual([]);
  });

  it('ends with the role: a coordinator who is one no more changes nothing', async () => {
    const demoted = { ...world.marit, role: 'operator' } as const;
    await expect(getWorkbench(world.services, demoted, slug)).rejects.toThrow(NotFound);
  });

  it('lets only crews of the roster answer, each for its own station', async () => {
    await invite('QA1LUN');
    await invite('QB7TID');
    const { services, people, marit } = world;
    const answer = (viewer: typeof marit, callSign: string) =>
      saveAnswer(services, viewer, slug, id(callSign), answerForm());
    await expect(answer(people['QA1LUN']!, 'QB7TID')).rejects.toThrow(Forbidden);
    await expect(answer(people['stranger']!, 'QA1LUN')).rejects.toThrow(NotFound);
    await expect(answer(people['QC2FAR']!, 'QC2FAR')).rejects.toThrow(NotFound);
    await expect(answer(marit, 'QC2FAR')).rejects.toThrow(NotFound);
    await expect(getAnswerPage(services, people['QA1LUN']!, slug, id('QB7TID'))).rejects.toThrow(
      Forbidden,
    );
    await answer(people['QA1LUN']!, 'QA1LUN');
    await answer(marit, 'QB7TID');
    expect((await roster()).map((station) => station.answer)).toEqual(['coming', 'coming']);
  });
});

describe('changing the settings', () => {
  it('refuses a version that somebody else has changed', async () => {
    const { services, marit } = world;
    await updateActivity(services, marit, slug, 1, settings({ title: 'Another' }));
    await expect(updateActivity(services, marit, slug, 1, settings())).rejects.toThrow(Conflict);
    expect((await getActivity(services, marit, slug)).activity).toMatchObject({
      title: 'Another',
      version: 2,
      slug,
    });
  });

  it('leaves the dates of a published plan alone', async () => {
    const { services, marit } = world;
    await services.db.updateTable('activity').set({ state: 'published' }).execute();
    await expect(
      updateActivity(services, marit, slug, 1, settings({ 'start.clock': '06:00' })),
    ).rejects.toThrow('dates stand still');
    const bands = { 'bands.1296.on': 'yes' };
    await updateActivity(services, marit, slug, 1, settings({ ...bands, notes: 'Bring cake' }));
  });

  it('leaves the bands of a published plan alone, and lets nothing through that does not fit', async () => {
    const { services, marit } = world;
    await services.db.updateTable('activity').set({ state: 'published' }).execute();
    const bands = { 'bands.1296.on': 'yes' };
    for (const [changes, sentence] of [
      [{}, 'bands stand still'],
      [{ ...bands, 'bands.1296.frequencyMhz': '1296.2' }, 'bands stand still'],
      [{ ...bands, slotMinutes: '40' }, 'does not fit starts every'],
    ] as const) {
      await expect(updateActivity(services, marit, slug, 1, settings(changes))).rejects.toThrow(
        sentence,
      );
    }
    world.clock.nowMs = START_MS + 3 * DAY_MS;
    await updateActivity(services, marit, slug, 1, settings({ ...bands, notes: 'It was fine' }));
  });
});

describe('the roster', () => {
  it('numbers stations in the order in which they come, and closes gaps', async () => {
    for (const callSign of ['QA1LUN', 'QB7TID', 'QC2FAR']) await invite(callSign);
    await inviteGuest(world.services, world.marit, slug, GUEST);
    await moveOnRoster(world.services, world.marit, slug, id('QC2FAR'), 1);
    expect((await roster()).map(({ callSign }) => callSign)).toEqual([
      'QC2FAR',
      'QA1LUN',
      'QB7TID',
      'QX7ARN',
    ]);
    await removeFromRoster(world.services, world.marit, slug, id('QA1LUN'));
    expect((await roster()).map(({ place, callSign }) => `${place} ${callSign}`)).toEqual([
      '1 QC2FAR',
      '2 QB7TID',
      '3 QX7ARN',
    ]);
  });

  it('takes wishes about a station away with it', async () => {
    await invite('QA1LUN');
    await invite('QB7TID');
    const wish = answerForm({ [`wish.${id('QB7TID')}`]: '3', 'wish.nobody': 'never' });
    await saveAnswer(world.services, world.people['QA1LUN']!, slug, id('QA1LUN'), wish);
    const wishes = async () => (await getWorkbench(world.services, world.marit, slug)).wishes;
    expect(await wishes()).toEqual([
      { stationId: id('QA1LUN'), partnerId: id('QB7TID'), kind: 'want', priority: 3 },
    ]);
    await removeFromRoster(world.services, world.marit, slug, id('QB7TID'));
    expect(await wishes()).toEqual([]);
  });

  it('holds nobody twice, neither a station nor its call sign', async () => {
    await invite('QA1LUN');
    await expect(invite('QA1LUN')).rejects.toThrow(Conflict);
    await inviteGuest(world.services, world.marit, slug, GUEST);
    await expect(
      inviteGuest(world.services, world.marit, slug, { ...GUEST, email: 'other@x.example' }),
    ).rejects.toThrow(Conflict);
    const people = await world.services.db
      .selectFrom('person')
      .select('email')
      .where('email', '=', 'other@x.example')
      .execute();
    expect(people).toEqual([]);
  });

  it('cannot be filled with stations that are not listed, unless they are the coordinator’s', async () => {
    await world.services.db.updateTable('station').set({ listed: 0 }).execute();
    await expect(invite('QA1LUN')).rejects.toThrow(NotFound);
  });

  it('takes nobody any more once the activity is over', async () => {
    world.clock.nowMs = START_MS + 3 * DAY_MS;
    await expect(invite('QA1LUN')).rejects.toThrow('This activity is over.');
    await expect(inviteGuest(world.services, world.marit, slug, GUEST)).rejects.toThrow(Conflict);
    expect(await world.mails()).toEqual([]);
  });

  it('sends a guest to the list when the call sign is registered, and takes no blocked address', async () => {
    const { services, marit } = world;
    await expect(
      inviteGuest(services, marit, slug, { ...GUEST, callSign: 'QA1LUN' }),
    ).rejects.toThrow('from the list');
    await services.db.insertInto('mail_block').values({ email: GUEST.email, at: 0 }).execute();
    await expect(inviteGuest(services, marit, slug, GUEST)).rejects.toThrow('cannot be written to');
    expect(await roster()).toEqual([]);
    expect(await world.mails()).toEqual([]);
  });
});

describe('mails of the roster', () => {
  it('invite members to the answer page and guests by a link of their own', async () => {
    await invite('QA1LUN');
    await inviteGuest(world.services, world.marit, slug, GUEST);
    const [guest, member] = await world.mails();
    expect(guest).toMatchObject({ recipient: GUEST.email, topic: 'activity' });
    expect(guest!.text_body).toMatch(/\/roster\/[\w-]{43}\n/);
    expect(member!.text_body).toContain(`/activities/${slug}/answer`);
    expect(member!.text_body).not.toContain('/roster/');
    expect(member!.activity_id).not.toBeNull();
  });

  it('say where they are switched off, and go to nobody who did', async () => {
    const { services, people } = world;
    await invite('QA1LUN');
    const [mail] = await world.mails();
    expect(mail!.unsubscribe_url).toMatch(/\/unsubscribe\//);
    expect(mail!.text_body).toContain(mail!.unsubscribe_url!);
    expect(mail!.reply_to).toBe(world.marit.email);
    await services.db
      .insertInto('mail_preference')
      .values({
        person_id: people['QB7TID']!.id,
        preference_json: JSON.stringify({ topics: { activity: false } }),
        updated_at: 0,
      })
      .execute();
    await invite('QB7TID');
    expect(await world.mails()).toHaveLength(1);
  });

  it('remind who has not answered, by hand once a day', async () => {
    await invite('QA1LUN');
    await invite('QB7TID');
    await saveAnswer(
      world.services,
      world.people['QA1LUN']!,
      slug,
      id('QA1LUN'),
      answerForm({ answer: 'notComing' }),
    );
    const remind = () => remindRoster(world.services, world.marit, slug);
    await expect(remind()).rejects.toThrow('within the last day');
    world.clock.nowMs += DAY_MS;
    expect(await remind()).toEqual({ reminded: 1 });
    await expect(remind()).rejects.toThrow(Conflict);
    const reminders = (await world.mails()).filter(({ subject }) => /waits for/.test(subject));
    expect(reminders.map(({ recipient }) => recipient)).toEqual([world.people['QB7TID']!.email]);
  });

  it('remind by themselves three days before answers are due, once', async () => {
    await updateActivity(
      world.services,
      world.marit,
      slug,
      1,
      settings({ 'answersBy.day': '2027-02-06' }),
    );
    await invite('QA1LUN');
    await inviteGuest(world.services, world.marit, slug, GUEST);
    const dueMs = START_MS - 7 * DAY_MS;
    world.clock.nowMs = dueMs - 3 * DAY_MS - 1;
    expect(await remindDueRosters(world.services)).toBe(0);
    world.clock.nowMs += 1;
    expect(await remindDueRosters(world.services)).toBe(2);
    expect(await remindDueRosters(world.services)).toBe(0);
    world.clock.nowMs = dueMs - 1;
    // Invited since then: knows.
    await invite('QB7TID');
    expect(await remindDueRosters(world.services)).toBe(0);
    const reminders = (await world.mails()).filter(({ subject }) => /waits for/.test(subject));
    expect(reminders).toHaveLength(2);
  });
});
