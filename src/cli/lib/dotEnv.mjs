import { existsSync } from 'node:fs';

/** Reads .env when there is one; what is already in the environment wins. */
export function loadDotEnv() {
  if (existsSync('.env')) process.loadEnvFile('.env');
}
