import { createHmac } from 'node:crypto';
import { authSecret } from '../auth/secret';
import type { Config } from '../config';

const ALPHABET = 'abcdefghijklmnopqrstuvwxyz234567';
/** 26 letters of 5 bits: 130 bits. */
const LENGTH = 26;

/** What makes a reply address that of one person and one sked; it cannot be guessed. */
export function replyToken(config: Pick<Config, 'dataDir'>, uid: string, personId: string): string {
  const digest = createHmac('sha256', authSecret(config.dataDir))
    .update(JSON.stringify(['reply', uid, personId]))
    .digest();
  let bits = BigInt(`0x${digest.toString('hex')}`) >> BigInt(256 - LENGTH * 5);
  let text = '';
  for (let place = 0; place < LENGTH; place += 1) {
    text = ALPHABET[Number(bits & 31n)]! + text;
    bits >>= 5n;
  }
  return text;
}

/** The address to which one person answers mails about one sked, or null when no mail is received here. */
export function replyAddress(
  config: Pick<Config, 'dataDir' | 'inbound'>,
  uid: string,
  personId: string,
): string | null {
  const { address } = config.inbound;
  if (address === null) return null;
  const at = address.lastIndexOf('@');
  return `${address.slice(0, at)}+${replyToken(config, uid, personId)}${address.slice(at)}`;
}

/** The tokens among addresses that mail came to. */
export function replyTokensIn(
  config: Pick<Config, 'inbound'>,
  addresses: readonly string[],
): string[] {
  const { address } = config.inbound;
  if (address === null) return [];
  const at = address.lastIndexOf('@');
  const beginning = `${address.slice(0, at)}+`.toLowerCase();
  const end = address.slice(at).toLowerCase();
  return addresses
    .map((one) => one.trim().toLowerCase())
    .filter((one) => one.startsWith(beginning) && one.endsWith(end))
    .map((one) => one.slice(beginning.length, one.length - end.length))
    .filter((token) => /^[a-z2-7]{26}$/.test(token));
}
