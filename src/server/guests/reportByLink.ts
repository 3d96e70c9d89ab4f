import { RESULT_WORDS } from '../../domain/sked/view';
import { inTransaction } from '../db/transaction';
import type { Services } from '../services';
import { reportSked, type ReportInput } from '../skeds/reportSked';
import { answerByLink, type Answering } from './answerByLink';
import { requireUsableLink } from './guestLink';
import { sendLinkMail } from './linkMail';

/**
 * Reports behind a link. A report is mailed to the others only, so the person gets one with the next link: whoever has no
 * account always holds one that works. Throws as `answerByLink`.
 */
export async function reportByLink(
  services: Services,
  answering: Answering,
  input: ReportInput,
): Promise<string> {
  const { person, skedId } = await requireUsableLink(services, answering.secret);
  const path = await answerByLink(services, answering, (viewer, link) =>
    reportSked(services, viewer, skedId, { ...input, ...link }),
  );
  await inTransaction(services.db, (tx) =>
    sendLinkMail(
      tx,
      services,
      { skedId, personId: person.id },
      {
        title: 'Your report is kept',
        paragraph: `You reported: ${RESULT_WORDS[input.result]}. With this link you can change it.`,
      },
    ),
  );
  return path;
}
