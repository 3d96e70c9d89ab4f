import type { Migration } from 'kysely';
import { migration0001 } from './0001_ground';
import { migration0002 } from './0002_noise_records';

/** Every migration in order. A landed one is frozen: changes go into a new one. */
export const migrations: Record<string, Migration> = {
  '0001_ground': migration0001,
  '0002_noise_records': migration0002,
};
