import { messageWordsSchema } from '../../domain/sked/talk';
import { inTransaction } from '../db/transaction';
import { AppError, InvalidInput } from '../errors';
import type { Services } from '../services';
import { addMessage } from '../skeds/talk';
import { claimMail, type InboundOutcome } from './claim';
import { mailBack } from './mailBack';
import { ownWords } from './ownWords';
import type { Answerer } from './whoAnswers';

/** What somebody wrote in answer to a mail becomes a message to the other parties. Throws `Duplicate`. */
export async function answerInWords(
  services: Services,
  about: Answerer,
  text: string,
  messageId: string,
): Promise<InboundOutcome> {
  const own = ownWords(text);
  if (own === '') return 'ignored';
  try {
    return await inTransaction<InboundOutcome>(services.db, async (tx) => {
      await claimMail(tx, services, messageId, 'message');
      const stationId = about.stationIds[0];
      if (stationId === undefined) {
        throw new InvalidInput('You dropped out of the sked, so nothing was sent to the others.');
      }
      await addMessage(tx, services, {
        skedId: about.loaded.row.id,
        stationId,
        personId: about.person.personId,
        words: wordsOf(own),
      });
      return 'message';
    });
  } catch (error) {
    if (!(error instanceof AppError)) throw error;
    await inTransaction(services.db, async (tx) => {
      await claimMail(tx, services, messageId, 'refused');
      await mailBack(tx, services, about, { sentences: [error.message], corrects: false });
    });
    return 'refused';
  }
}

function wordsOf(text: string): string {
  const parsed = messageWordsSchema.safeParse(text);
  if (parsed.success) return parsed.data;
  throw new InvalidInput(`${parsed.error.issues[0]!.message} Nothing was sent to the others.`);
}
