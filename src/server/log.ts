import pino from 'pino';

/** Structured log on standard error. Never log addresses, tokens, words of people or request bodies. */
export const log = pino(
  {
    level: process.env['LOG_LEVEL'] ?? 'info',
    base: null,
    timestamp: pino.stdTimeFunctions.isoTime,
  },
  pino.destination({ dest: 2, sync: true }),
);
