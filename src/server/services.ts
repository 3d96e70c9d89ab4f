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

let shared: Services | undefined;

/** The services of this process; pages, actions and the worker use these. */
export function services(): Services {
  shared ??= { db: openDatabase(config().databaseFile), config: config(), now: () => Date.now() };
  return shared;
}
