import { inTransaction } from '../db/transaction';
import { Conflict } from '../errors';
import type { Services } from '../services';
import { ownRosterStations } from './access';
import { readAnswerLink } from './answerLink';
import { mailRoster } from './mailRoster';

/** Mails a fresh link to the person whose used or expired link it is, to nobody else. Throws `NotFound` or `Conflict`. */
export async function mailFreshLink(services: Services, secret: string): Promise<void> {
  await inTransaction(services.db, async (tx) => {
    const { activity, person } = await readAnswerLink(tx, services, secret);
    if (activity.end_at <= services.now()) throw new Conflict('This activity is over.');
    const own = await ownRosterStations(tx, activity.id, person.id);
    await mailRoster(
      tx,
      services,
      activity,
      'freshLink',
      own.map(({ stationId }) => stationId),
      ({ personId }) => personId === person.id,
    );
  });
}
