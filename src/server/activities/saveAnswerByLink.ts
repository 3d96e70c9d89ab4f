import { inTransaction } from '../db/transaction';
import { Forbidden } from '../errors';
import type { Services } from '../services';
import { ownRosterStations } from './access';
import { consumeAnswerLink, makeAnswerLink } from './answerLink';
import { writeAnswer, type AnswerForm } from './saveAnswer';

/**
 * The answer of somebody without an account, by the link in their mail. Uses the link up in the same transaction and
 * returns the secret of a fresh one, by which they can change their answer.
 */
export async function saveAnswerByLink(
  services: Services,
  secret: string,
  stationId: string,
  form: AnswerForm,
): Promise<{ secret: string; callSign: string; answer: 'coming' | 'notComing' }> {
  return inTransaction(services.db, async (tx) => {
    const { activity, person } = await consumeAnswerLink(tx, services, secret);
    const own = await ownRosterStations(tx, activity.id, person.id);
    if (!own.some((one) => one.stationId === stationId)) {
      throw new Forbidden('This link does not answer for that station.');
    }
    const saved = await writeAnswer(tx, services, activity, stationId, person.id, form);
    return { ...saved, secret: await makeAnswerLink(tx, services, person.id, activity) };
  });
}
