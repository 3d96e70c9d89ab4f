import type { Config } from '../config';

const ALWAYS: Record<string, string> = {
  'x-content-type-options': 'nosniff',
  // Not "no-referrer": a form on such a page would send the origin "null".
  'referrer-policy': 'same-origin',
  'x-frame-options': 'DENY',
  'cross-origin-opener-policy': 'same-origin',
  'permissions-policy': 'camera=(), microphone=(), payment=(), usb=(), geolocation=(self)',
};

/** Adds what every answer carries. The policy for scripts and styles comes from Astro, per page. */
export function addSecurityHeaders(headers: Headers, config: Config): void {
  // An answer whose address is a secret may ask for more.
  const silent = headers.get('referrer-policy') === 'no-referrer';
  for (const [name, value] of Object.entries(ALWAYS)) headers.set(name, value);
  if (silent) headers.set('referrer-policy', 'no-referrer');
  const isPage = headers.get('content-type')?.startsWith('text/html') ?? false;
  const policy = headers.get('content-security-policy') ?? (isPage ? '' : "default-src 'none'");
  const parts = [policy.replace(/[;\s]+$/, ''), "frame-ancestors 'none'"].filter(Boolean);
  headers.set('content-security-policy', parts.join('; '));
  if (config.publicUrl.startsWith('https:')) {
    headers.set('strict-transport-security', 'max-age=31536000');
  }
}
