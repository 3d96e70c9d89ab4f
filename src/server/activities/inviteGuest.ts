import { z } from 'zod';
import { BAND_IDS } from '../../domain/station/bands';
import { callSignSchema, locatorSchema } from '../../domain/station/schema';
import type { Viewer } from '../auth/viewer';
import { inTransaction, type Tx } from '../db/transaction';
import { InvalidInput } from '../errors';
import { guestSchema } from '../guests/guestSchema';
import { guestStation } from '../guests/guestStation';
import { emailField } from '../people/fields';
import type { Services } from '../services';
import { requireEditor } from './access';
import { addToRoster, type RosterEntry } from './addToRoster';
import { mailRoster } from './mailRoster';
import type { ActivityRow } from './records';

/** A coordinator fills a roster in one go. */
const NEW_ADDRESSES_A_DAY = 200;

export const guestInvitationSchema = z.object({
  callSign: callSignSchema,
  email: emailField,
  locator: locatorSchema,
  bands: z.partialRecord(z.enum(BAND_IDS), z.literal('yes')).default({}),
});

export type GuestInvitation = z.output<typeof guestInvitationSchema>;

/**
 * Puts a station without an account on the roster and writes to its operator. Throws `InvalidInput` when a listed
 * station has the call sign, or the address cannot be written to; `NotFound`, `Forbidden` or `Conflict`.
 */
export async function inviteGuest(
  services: Services,
  viewer: Pick<Viewer, 'id' | 'role' | 'email'>,
  slug: string,
  given: GuestInvitation,
): Promise<{ callSign: string }> {
  return inTransaction(services.db, async (tx) => {
    const activity = await requireEditor(tx, viewer, slug);
    const bands = BAND_IDS.filter((band) => given.bands[band] === 'yes');
    const stationId = await addGuest(tx, services, viewer, activity, given, {
      bands: bands.length > 0 ? bands : null,
    });
    await mailRoster(tx, services, activity, 'invitation', [stationId]);
    return { callSign: given.callSign };
  });
}

/** The guest's station, on the roster. Throws as `inviteGuest` does. */
export async function addGuest(
  tx: Tx,
  services: Services,
  viewer: Pick<Viewer, 'id' | 'email'>,
  activity: ActivityRow,
  given: Pick<GuestInvitation, 'callSign' | 'email' | 'locator'>,
  entry: RosterEntry,
): Promise<string> {
  const { callSign, email, locator } = given;
  const registered = await tx
    .selectFrom('station')
    .select('id')
    .where('call_sign', '=', callSign)
    .where('guest', '=', 0)
    .where('listed', '=', 1)
    .executeTakeFirst();
  if (registered) {
    const message = `${callSign} is registered. Invite it from the list of stations.`;
    throw new InvalidInput(message, [{ path: 'callSign', message }]);
  }
  const { id } = await guestStation(
    tx,
    services,
    viewer,
    guestSchema.parse({ callSign, email, locator }),
    { band: null, field: '', newAddressesADay: NEW_ADDRESSES_A_DAY },
  );
  await addToRoster(tx, services, activity, { id, callSign }, entry);
  return id;
}
