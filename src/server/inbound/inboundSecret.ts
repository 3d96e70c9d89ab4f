import { createHash, timingSafeEqual } from 'node:crypto';
import type { APIContext } from 'astro';
import { SignInNeeded } from '../errors';
import { clientKey } from '../http/clientAddress';
import { limitRate } from '../http/rateLimit';

const WRONG_A_MINUTE = 10;

/** Throws `SignInNeeded` unless the request shows the secret, `TooManyRequests` after several wrong ones. */
export async function requireInboundSecret(context: APIContext, secret: string): Promise<void> {
  const given = context.request.headers.get('authorization') ?? '';
  if (timingSafeEqual(digest(given), digest(`Bearer ${secret}`))) return;
  await limitRate('inbound', clientKey(context), WRONG_A_MINUTE);
  throw new SignInNeeded('The Authorization header does not carry the secret.');
}

function digest(text: string): Buffer {
  return createHash('sha256').update(text).digest();
}
