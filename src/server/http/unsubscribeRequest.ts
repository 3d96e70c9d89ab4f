import { UnsupportedType, InvalidInput } from '../errors';
import { isFromOwnPage } from './origin';
import { readText } from './respond';

const MAX_BYTES = 4000;

/**
 * What a request to an unsubscribe address asks for: null when it only looks (GET, HEAD), "off" for the one press of
 * RFC 8058, which a mail program sends without origin and cookies, "on" for the button of the page. Throws when a POST
 * asks for neither; switching on again must come from a page of ours.
 */
export async function askedByMailLink(
  request: Request,
  publicUrl: string,
): Promise<'on' | 'off' | null> {
  if (request.method !== 'POST') return null;
  const form = await formOf(request);
  if (form.get('List-Unsubscribe') === 'One-Click') return 'off';
  if (form.get('switch') === 'on' && isFromOwnPage(request.headers, publicUrl)) return 'on';
  throw new InvalidInput('This address takes List-Unsubscribe=One-Click. Nothing was changed.');
}

/** RFC 8058 lets the program choose between the two encodings of forms. */
async function formOf(request: Request): Promise<FormData> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^(application\/x-www-form-urlencoded|multipart\/form-data)\b/i.test(type)) {
    throw new UnsupportedType('Send the body as a form.');
  }
  const body = await readText(request, MAX_BYTES);
  try {
    return await new Response(body, { headers: { 'content-type': type } }).formData();
  } catch {
    throw new InvalidInput('The body is not a form. Nothing was changed.');
  }
}
