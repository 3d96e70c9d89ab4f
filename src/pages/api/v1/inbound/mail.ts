import type { APIRoute } from 'astro';
import { openToAll } from '../../../../server/auth/guards';
import { NotFound, UnsupportedType } from '../../../../server/errors';
import { requireInboundSecret } from '../../../../server/inbound/inboundSecret';
import { LARGEST_MAIL_BYTES, receiveMail } from '../../../../server/inbound/receiveMail';
import { endpoint, json, readBytes } from '../../../../server/http/respond';
import { services } from '../../../../server/services';

/** A mail server hands in one mail as it came. There only where an address and a secret are configured. */
export const POST: APIRoute = endpoint(async (context) => {
  openToAll(context);
  const all = services();
  const { address, secret } = all.config.inbound;
  if (address === null || secret === null) {
    throw new NotFound('The API has nothing at this address.');
  }
  await requireInboundSecret(context, secret);
  const type = context.request.headers.get('content-type') ?? '';
  if (!/^message\/rfc822\b/i.test(type)) {
    throw new UnsupportedType('Send the mail as message/rfc822.');
  }
  const raw = await readBytes(context.request, LARGEST_MAIL_BYTES);
  return json({ outcome: await receiveMail(all, raw) });
});
