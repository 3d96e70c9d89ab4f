import type { AstroGlobal } from 'astro';
import { describe, expect, it, vi } from 'vitest';
import type { Viewer } from '~/server/auth/viewer';
import { TooManyRequests } from '~/server/errors';
import { clientKey } from '~/server/http/clientAddress';
import { limitCalculator, limitRate, limitVisitor } from '~/server/http/rateLimit';

vi.mock('~/server/services', () => ({
  services: () => ({ config: { calculatorRequestsPerMinute: 2 } }),
}));

describe('limitRate', () => {
  it('lets so many through in a minute and says how long to wait', async () => {
    for (let i = 0; i < 3; i += 1) await limitRate('trial', 'one', 3);
    const refused = await limitRate('trial', 'one', 3).catch((error: unknown) => error);
    expect(refused).toBeInstanceOf(TooManyRequests);
    const { retryAfterS, status } = refused as TooManyRequests;
    expect(status).toBe(429);
    expect(retryAfterS).toBeGreaterThan(50);
    expect(retryAfterS).toBeLessThanOrEqual(60);
  });

  it('counts each key and each bucket apart', async () => {
    await limitRate('apart', 'one', 1);
    await limitRate('apart', 'two', 1);
    await limitRate('apart too', 'one', 1);
    await expect(limitRate('apart', 'one', 1)).rejects.toBeInstanceOf(TooManyRequests);
  });
});

describe('limitVisitor', () => {
  const from = (clientAddress: string) => ({ clientAddress }) as AstroGlobal;

  it('counts pages and calculators of a visitor together', async () => {
    await limitVisitor(from('192.0.2.20'), null);
    await limitCalculator(from('192.0.2.20'));
    const third = limitVisitor(from('192.0.2.20'), null);
    await expect(third).rejects.toBeInstanceOf(TooManyRequests);
    await limitVisitor(from('192.0.2.21'), null);
  });

  it('lets people with an account open pages as they like', async () => {
    for (let i = 0; i < 5; i += 1) {
      await limitVisitor(from('192.0.2.22'), { id: 'someone' } as Viewer);
    }
    await limitVisitor(from('192.0.2.22'), null);
  });
});

describe('clientKey', () => {
  const key = (clientAddress: string) => clientKey({ clientAddress });
  it('is the IPv4 address, also when it is written as IPv6', () => {
    expect(key('192.0.2.7')).toBe('192.0.2.7');
    expect(key('::ffff:192.0.2.7')).toBe('192.0.2.7');
  });

  it('is the /64 of an IPv6 address', () => {
    expect(key('2001:db8:1:2:3:4:5:6')).toBe('2001:db8:1:2::/64');
    expect(key('2001:db8:1:2::9')).toBe('2001:db8:1:2::/64');
    expect(key('2001:0db8:0001:0002::')).toBe('2001:db8:1:2::/64');
    expect(key('2001:db8::1')).toBe('2001:db8:0:0::/64');
    expect(key('::1')).toBe('0:0:0:0::/64');
  });
});
