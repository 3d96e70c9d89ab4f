import type { Migration } from 'kysely';
import { migration0001 } from './0001_ground';
import { migration0002 } from './0002_noise_records';
import { migration0003 } from './0003_skeds_for_everyone';
import { migration0004 } from './0004_activities';

/** Every migration in order. A landed one is frozen: changes go into a new one. */
export const migrations: Record<string, Migration> = {
  '0001_ground': migration0001,
  '0002_noise_records': migration0002,
  '0003_skeds_for_everyone': migration0003,
  '0004_activities': migration0004,
};
