import type { CrewInvitation } from '../../domain/station/schema';
import { DAY_MS } from '../../domain/time/interval';
import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { Conflict } from '../errors';
import { newId, newSecret } from '../ids';
import { enqueueMail } from '../mail/outbox';
import type { Services } from '../services';
import { requireKeeper } from './access';
import { crewInvitationMail } from './crewInvitationMail';

const INVITATION_DAYS = 14;
const MAX_OPEN_INVITATIONS = 20;

/**
 * Invites somebody to the crew by mail, for a keeper. A new invitation to the same address takes the
 * place of an open one. Throws `NotFound`, `Forbidden`, or `Conflict` for who is already in the crew.
 */
export async function inviteCrew(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'name'>,
  stationId: string,
  input: CrewInvitation,
): Promise<{ id: string }> {
  const now = services.now();
  const expiresMs = now + INVITATION_DAYS * DAY_MS;
  const { secret, hash } = newSecret();
  const id = newId();
  await inTransaction(services.db, async (tx) => {
    const station = await requireKeeper(tx, viewer, stationId);
    const member = await tx
      .selectFrom('station_crew')
      .innerJoin('person', 'person.id', 'station_crew.person_id')
      .select('person.id')
      .where('station_crew.station_id', '=', stationId)
      .where('person.email', '=', input.email)
      .executeTakeFirst();
    if (member) {
      throw new Conflict(`${input.email} is already in the crew of ${station.call_sign}.`);
    }
    await tx
      .deleteFrom('crew_invitation')
      .where('station_id', '=', stationId)
      .where('accepted_at', 'is', null)
      .where((eb) => eb.or([eb('email', '=', input.email), eb('expires_at', '<=', now)]))
      .execute();
    const open = await tx
      .selectFrom('crew_invitation')
      .select((eb) => eb.fn.countAll<number>().as('count'))
      .where('station_id', '=', stationId)
      .where('accepted_at', 'is', null)
      .executeTakeFirstOrThrow();
    if (open.count >= MAX_OPEN_INVITATIONS) {
      throw new Conflict(
        `${MAX_OPEN_INVITATIONS} invitations are open. Withdraw one before you invite more.`,
      );
    }
    await tx
      .insertInto('crew_invitation')
      .values({
        id,
        station_id: stationId,
        email: input.email,
        crew_role: input.crewRole,
        token_hash: hash,
        invited_by: viewer.id,
        created_at: now,
        expires_at: expiresMs,
        accepted_at: null,
      })
      .execute();
    await enqueueMail(
      tx,
      services,
      crewInvitationMail({
        publicUrl: services.config.publicUrl,
        to: input.email,
        inviterName: viewer.name,
        callSign: station.call_sign,
        crewRole: input.crewRole,
        secret,
        expiresMs,
      }),
    );
  });
  return { id };
}
