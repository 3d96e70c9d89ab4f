import type { StationCrew } from '../../domain/station/views';
import type { Viewer } from '../auth/viewer';
import type { Services } from '../services';
import { requireCrew } from './access';

/** The crew with its open invitations, for its members; mail addresses and invitations for keepers only. */
export async function listCrew(
  services: Services,
  viewer: Pick<Viewer, 'id'>,
  stationId: string,
): Promise<StationCrew> {
  const { crewRole } = await requireCrew(services.db, viewer, stationId);
  const keeper = crewRole === 'keeper';
  const members = await services.db
    .selectFrom('station_crew')
    .innerJoin('person', 'person.id', 'station_crew.person_id')
    .select(['person.id', 'person.name', 'person.email', 'station_crew.crew_role'])
    .where('station_crew.station_id', '=', stationId)
    .orderBy('station_crew.crew_role')
    .orderBy('person.name')
    .execute();
  const invitations = keeper
    ? await services.db
        .selectFrom('crew_invitation')
        .select(['id', 'email', 'crew_role', 'expires_at'])
        .where('station_id', '=', stationId)
        .where('accepted_at', 'is', null)
        .where('expires_at', '>', services.now())
        .orderBy('email')
        .execute()
    : [];
  return {
    members: members.map((member) => ({
      personId: member.id,
      name: member.name,
      email: keeper ? member.email : null,
      crewRole: member.crew_role,
      isViewer: member.id === viewer.id,
    })),
    invitations: invitations.map((invitation) => ({
      id: invitation.id,
      email: invitation.email,
      crewRole: invitation.crew_role,
      expiresMs: invitation.expires_at,
    })),
  };
}
