import { createHmac, timingSafeEqual } from 'node:crypto';
import { SWITCHABLE_TOPICS, type SwitchableTopic } from '../../domain/people/mailPreference';
import { paths } from '../../paths';
import { authSecret } from '../auth/secret';
import type { Config } from '../config';

export interface Unsubscribing {
  personId: string;
  topic: SwitchableTopic;
}

/** What switches one topic off for one person without signing in: it can do nothing else, and does not expire. */
export function unsubscribeToken(
  { dataDir }: Pick<Config, 'dataDir'>,
  { personId, topic }: Unsubscribing,
): string {
  return `${personId}.${topic}.${seal(dataDir, personId, topic)}`;
}

/** The address for the headers of RFC 8058 and for the footer of a mail. */
export function unsubscribeUrl(
  config: Pick<Config, 'dataDir' | 'publicUrl'>,
  what: Unsubscribing,
): string {
  return config.publicUrl + paths.unsubscribe(unsubscribeToken(config, what));
}

/** What the token was made for, or null when it was not made here. */
export function readUnsubscribeToken(
  { dataDir }: Pick<Config, 'dataDir'>,
  token: string,
): Unsubscribing | null {
  const [personId = '', topic = '', given = '', ...more] = token.split('.');
  if (more.length > 0 || !isTopic(topic)) return null;
  const right = Buffer.from(seal(dataDir, personId, topic));
  const sent = Buffer.from(given);
  if (sent.length !== right.length || !timingSafeEqual(sent, right)) return null;
  return { personId, topic };
}

function isTopic(text: string): text is SwitchableTopic {
  return (SWITCHABLE_TOPICS as readonly string[]).includes(text);
}

function seal(dataDir: string, personId: string, topic: string): string {
  return createHmac('sha256', authSecret(dataDir))
    .update(`unsubscribe\n${personId}\n${topic}`)
    .digest('base64url');
}
