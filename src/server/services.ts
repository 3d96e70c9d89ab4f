import { config, type Config } from './config';
import { openDatabase, type Db } from './db/connection';

/**
 * What a use case needs from outside. Use cases take it as their first parameter, so that tests pass
 * their own database, clock and configuration.
 */
export interface Services {
  db: Db;
  config: Config;
  /** Milliseconds UTC. */
  now: () => number;
}

/**
 * The built server and the process around it each carry their own copy of this module, so the one
 * instance of the process lives on `globalThis`.
 */
const holder = globalThis as typeof globalThis & { [key: symbol]: Services | undefined };
const KEY = Symbol.for('echotide.services');

/** The services of this process; pages, actions and the worker use these. */
export function services(): Services {
  return (holder[KEY] ??= {
    db: openDatabase(config().databaseFile),
    config: config(),
    now: () => Date.now(),
  });
}

/** Closes the database of this process, if it was opened. The last thing before the process ends. */
export async function closeServices(): Promise<void> {
  const open = holder[KEY];
  holder[KEY] = undefined;
  await open?.db.destroy();
}
