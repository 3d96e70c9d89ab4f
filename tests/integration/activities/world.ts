import { activitySettingsSchema, nestedFields } from '~/domain/activity/settings';
import { DAY_MS } from '~/domain/time/interval';
import type { Role } from '~/server/db/tables';
import type { Viewer } from '~/server/auth/viewer';
import { createActivity } from '~/server/activities/createActivity';
import { FORM } from '../../unit/activity/form';
import { addPerson, newWorld, type World } from '../skeds/world';

export { NOW_MS } from '../skeds/world';

/** Sat 13 Feb 2027, 00:00 UTC; the world's clock stands at 18 January. */
export const START_MS = Date.UTC(2027, 1, 13);
export const END_MS = START_MS + 2 * DAY_MS;

export interface ActivityWorld extends World {
  marit: Viewer;
  otherCoordinator: Viewer;
  administrator: Viewer;
}

/** Three stations with a keeper each, two coordinators and an administrator. */
export async function newActivityWorld(): Promise<ActivityWorld> {
  const world = await newWorld();
  const person = async (name: string, role: Role) => {
    const viewer = await addPerson(world.services, name, 'Europe/Berlin');
    await world.services.db
      .updateTable('person')
      .set({ role })
      .where('id', '=', viewer.id)
      .execute();
    return { ...viewer, role };
  };
  return {
    ...world,
    marit: await person('Marit', 'coordinator'),
    otherCoordinator: await person('Otto', 'coordinator'),
    administrator: await person('Osvin', 'administrator'),
  };
}

/** An activity on 432 and 1296 MHz of the world's coordinator. */
export async function begin(
  world: ActivityWorld,
  changes: Record<string, string> = {},
): Promise<{ id: string; slug: string }> {
  const settings = activitySettingsSchema.parse(
    nestedFields({ ...FORM, 'bands.1296.on': 'yes', ...changes }),
  );
  return createActivity(world.services, world.marit, settings);
}

/** A whole answer as the form sends it. */
export function answerForm(changes: Record<string, string> = {}): Record<string, string> {
  return {
    answer: 'coming',
    'bands.1296': 'yes',
    when: 'usual',
    mostContacts: '',
    wants: 'everyone',
    priority: '2',
    note: '',
    ...changes,
  };
}
