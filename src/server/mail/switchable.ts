import { TOPIC_WORDS, type SwitchableTopic } from '../../domain/people/mailPreference';
import type { Config } from '../config';
import type { OutgoingMail } from './outbox';
import { renderMail, type MailContent } from './shell';
import { unsubscribeUrl } from './unsubscribe';

/** A mail of a kind that its reader can switch off: says so under the text and in the headers (RFC 8058). */
export function switchableMail(
  config: Pick<Config, 'dataDir' | 'publicUrl'>,
  to: { personId: string; email: string },
  topic: SwitchableTopic,
  { subject, content }: { subject: string; content: MailContent },
): OutgoingMail {
  const url = unsubscribeUrl(config, { personId: to.personId, topic });
  return {
    to: to.email,
    subject,
    ...renderMail({ ...content, unsubscribe: { label: `Stop ${TOPIC_WORDS[topic]}`, url } }),
    topic,
    personId: to.personId,
    unsubscribeUrl: url,
  };
}
