import type { CrewRole } from '../../domain/station/views';
import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';
import { inTransaction, type Tx } from '../db/transaction';
import { Conflict, NotFound } from '../errors';
import { hashSecret } from '../ids';
import type { Services } from '../services';
import { giveEntries } from '../skeds/crewEntries';
import { crewRoleOf } from './access';

export interface InvitationView {
  stationId: string;
  callSign: string;
  crewRole: CrewRole;
  inviterName: string;
  expiresMs: number;
  state: 'open' | 'accepted' | 'expired';
}

/** What an invitation says, without changing anything. Throws `NotFound` for an unknown or withdrawn one. */
export async function readInvitation(services: Services, secret: string): Promise<InvitationView> {
  return (await findInvitation(services.db, services.now(), secret)).view;
}

/**
 * Takes the invitation for the signed-in person and uses it up, whatever address it went to: who has the
 * secret link was given it. Throws `NotFound`, or `Conflict` when it was used or its time has passed.
 */
export async function joinCrew(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  secret: string,
): Promise<InvitationView> {
  const now = services.now();
  return inTransaction(services.db, async (tx) => {
    const { id, view } = await findInvitation(tx, now, secret);
    if (view.state === 'accepted') throw new Conflict('This invitation was already used.');
    if (view.state === 'expired') {
      throw new Conflict(`This invitation has expired. Ask ${view.inviterName} for a new one.`);
    }
    const present = await crewRoleOf(tx, view.stationId, viewer.id);
    if (!present) {
      await tx
        .insertInto('station_crew')
        .values({
          station_id: view.stationId,
          person_id: viewer.id,
          crew_role: view.crewRole,
          added_at: now,
        })
        .execute();
      await giveEntries(tx, services, view.stationId, viewer.id);
    } else if (present === 'operator' && view.crewRole === 'keeper') {
      await tx
        .updateTable('station_crew')
        .set({ crew_role: 'keeper' })
        .where('station_id', '=', view.stationId)
        .where('person_id', '=', viewer.id)
        .execute();
    }
    await tx
      .updateTable('crew_invitation')
      .set({ accepted_at: now })
      .where('id', '=', id)
      .execute();
    return { ...view, state: 'accepted' };
  });
}

async function findInvitation(
  db: Db | Tx,
  now: number,
  secret: string,
): Promise<{ id: string; view: InvitationView }> {
  const row = await db
    .selectFrom('crew_invitation')
    .innerJoin('station', 'station.id', 'crew_invitation.station_id')
    .innerJoin('person', 'person.id', 'crew_invitation.invited_by')
    .select([
      'crew_invitation.id',
      'crew_invitation.station_id',
      'crew_invitation.crew_role',
      'crew_invitation.expires_at',
      'crew_invitation.accepted_at',
      'station.call_sign',
      'person.name',
    ])
    .where('token_hash', '=', hashSecret(secret))
    .executeTakeFirst();
  if (!row) {
    throw new NotFound(
      'This invitation does not exist, or it was withdrawn or replaced by a newer one.',
    );
  }
  const state = row.accepted_at !== null ? 'accepted' : row.expires_at <= now ? 'expired' : 'open';
  return {
    id: row.id,
    view: {
      stationId: row.station_id,
      callSign: row.call_sign,
      crewRole: row.crew_role,
      inviterName: row.name,
      expiresMs: row.expires_at,
      state,
    },
  };
}
