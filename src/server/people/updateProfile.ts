import { z } from 'zod';
import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import type { Services } from '../services';
import { nameField, timeZoneField } from './fields';

export const profileSchema = z.object({ name: nameField, timeZone: timeZoneField });

export type Profile = z.output<typeof profileSchema>;

/** Changes the viewer's own name and time zone. */
export async function updateProfile(
  services: Services,
  viewer: Viewer,
  profile: Profile,
): Promise<void> {
  await inTransaction(services.db, (tx) =>
    tx
      .updateTable('person')
      .set({ name: profile.name, time_zone: profile.timeZone })
      .where('id', '=', viewer.id)
      .execute(),
  );
}
