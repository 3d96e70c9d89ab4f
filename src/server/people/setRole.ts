import { z } from 'zod';
import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import type { Services } from '../services';
import { getPerson } from './findPerson';
import { requireAnotherAdministrator } from './lastAdministrator';
import { recordAct } from './recordAct';

export const roleField = z.enum(['operator', 'coordinator', 'administrator'], {
  error: 'Choose operator, coordinator or administrator.',
});

/** Gives a person a role. Throws `NotFound`, or `Conflict` for the last administrator. */
export async function setRole(
  services: Services,
  viewer: Viewer,
  { personId, role }: { personId: string; role: z.output<typeof roleField> },
): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const person = await getPerson(tx, personId);
    if (person.role === role) return;
    if (role !== 'administrator') await requireAnotherAdministrator(tx, person);
    await tx.updateTable('person').set({ role }).where('id', '=', personId).execute();
    await recordAct(tx, services, viewer, 'person.role', personId, { from: person.role, to: role });
  });
}
