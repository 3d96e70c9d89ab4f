import { paths } from '../../paths';
import { isBySecret, isSecretPage } from './secretPages';

const LOOPBACK = ['127.0.0.1', 'localhost', '[::1]'];

/** Origins that are this server: the public one and, while that is a loopback one, its other names. */
export function ownOrigins(publicUrl: string): string[] {
  const url = new URL(publicUrl);
  if (!LOOPBACK.includes(url.hostname)) return [url.origin];
  const port = url.port ? `:${url.port}` : '';
  return LOOPBACK.map((name) => `${url.protocol}//${name}${port}`);
}

/** Whether the host asked for, with its port, is this server. */
export function isOwnHost(host: string, publicUrl: string): boolean {
  const asked = host.toLowerCase();
  return ownOrigins(publicUrl).some((origin) => {
    const own = new URL(origin);
    const withPort = own.port || (own.protocol === 'https:' ? '443' : '80');
    return asked === own.host || asked === `${own.hostname}:${withPort}`;
  });
}

const SAFE_METHODS = ['GET', 'HEAD', 'OPTIONS'];

/** Stateless computations; they change nothing, so anybody may call them from anywhere. */
const OPEN_CALCULATORS: readonly string[] = [paths.api.moon, paths.api.windows, paths.api.link];

/** Exactly one step below it: the token in the address is checked by the page itself. */
const UNSUBSCRIBE = new RegExp(`^(${paths.unsubscribe('[^/]+')}|${paths.noMore('[^/]+')})$`);

/** Asked by programs that show a secret of their own in a header, which no page of somebody else's can. */
const BY_SECRET: readonly string[] = [paths.api.inboundMail];

interface Asked {
  method: string;
  pathname: string;
  /** What follows the path, with its question mark; there an action can be named. */
  search: string;
  headers: Headers;
}

/**
 * Whether a request may change something: it comes from a page of ours. Browsers always tell the
 * origin of a POST from a form or a script; one that does not must at least say "same-origin". On pages whose address
 * is a secret that secret is what allows a change, and no cookie does.
 */
export function mayChange(
  { method, pathname, search, headers }: Asked,
  publicUrl: string,
): boolean {
  if (SAFE_METHODS.includes(method.toUpperCase())) return true;
  if (OPEN_CALCULATORS.includes(pathname) || BY_SECRET.includes(pathname)) return true;
  // A mail program unsubscribes by a POST without origin and cookies (RFC 8058), and without a query.
  if (method.toUpperCase() === 'POST' && UNSUBSCRIBE.test(pathname) && search === '') return true;
  // A form on a page that tells nobody its address has the origin "null" (Fetch, 3.2).
  if (isSecretPage(pathname) && isBySecret(search) && headers.get('origin') === 'null') {
    return ['same-origin', null].includes(headers.get('sec-fetch-site'));
  }
  return isFromOwnPage(headers, publicUrl);
}

/** Whether the browser says that a page of ours sent this. */
export function isFromOwnPage(headers: Headers, publicUrl: string): boolean {
  const origin = headers.get('origin');
  const site = headers.get('sec-fetch-site');
  if (origin !== null) return ownOrigins(publicUrl).includes(origin);
  return site === 'same-origin';
}
