import { inTransaction } from '../db/transaction';
import { log } from '../log';
import type { Services } from '../services';
import { answerByCalendar } from './answerByCalendar';
import { answerInWords } from './answerInWords';
import { Duplicate, type InboundOutcome } from './claim';
import { readAnswer } from './readAnswer';
import { readMail } from './readMail';
import { whoAnswers } from './whoAnswers';

export const LARGEST_MAIL_BYTES = 1_000_000;

/**
 * Takes a mail that came in. An answer of a calendar program counts as the person's answer; plain words become a message
 * to the other parties; everything else is let go. At most one mail goes back, and none to a program that is no
 * calendar. Throws `InvalidInput` when it is no mail at all.
 */
export async function receiveMail(services: Services, raw: Uint8Array): Promise<InboundOutcome> {
  const mail = await readMail(raw);
  const answer = readAnswer(mail.calendars);
  const about = await inTransaction(services.db, (tx) =>
    whoAnswers(tx, services.config, mail.recipients, answer?.uid ?? null),
  );
  if (!about || (mail.automatic && !answer)) return 'ignored';
  let outcome: InboundOutcome;
  try {
    outcome = answer
      ? await answerByCalendar(services, about, answer, mail.messageId)
      : await answerInWords(services, about, mail.text, mail.messageId);
  } catch (error) {
    if (!(error instanceof Duplicate)) throw error;
    outcome = 'duplicate';
  }
  log.info({ skedId: about.loaded.row.id, outcome }, 'mail received');
  return outcome;
}
