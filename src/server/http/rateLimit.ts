import type { APIContext, AstroGlobal } from 'astro';
import { RateLimiterMemory, RateLimiterRes } from 'rate-limiter-flexible';
import type { Viewer } from '../auth/viewer';
import { TooManyRequests } from '../errors';
import { services } from '../services';
import { clientKey } from './clientAddress';

const limiters = new Map<string, RateLimiterMemory>();

/**
 * Counts one attempt of `key` in `bucket`; throws `TooManyRequests` once more than `perMinute` came
 * within a minute. Counts live in this process and start afresh with it.
 */
export async function limitRate(bucket: string, key: string, perMinute: number): Promise<void> {
  const name = `${bucket}/${perMinute}`;
  let limiter = limiters.get(name);
  if (!limiter) {
    limiter = new RateLimiterMemory({ keyPrefix: name, points: perMinute, duration: 60 });
    limiters.set(name, limiter);
  }
  try {
    await limiter.consume(key);
  } catch (refused) {
    if (!(refused instanceof RateLimiterRes)) throw refused;
    const waitS = Math.max(1, Math.ceil(refused.msBeforeNext / 1000));
    throw new TooManyRequests(
      `That was more than ${perMinute} in a minute. Try again in ${waitS} s.`,
      waitS,
    );
  }
}

/** For the open calculators: counts this request for its client. Throws `TooManyRequests`. */
export async function limitCalculator(context: APIContext | AstroGlobal): Promise<void> {
  const { calculatorRequestsPerMinute } = services().config;
  await limitRate('calculator', clientKey(context), calculatorRequestsPerMinute);
}

/** For pages that compute for everybody: visitors without an account share the calculators' count, people have none. */
export async function limitVisitor(context: AstroGlobal, viewer: Viewer | null): Promise<void> {
  if (!viewer) await limitCalculator(context);
}
