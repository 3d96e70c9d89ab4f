import type { APIContext } from 'astro';
import { Forbidden, SignInNeeded } from '../errors';
import type { Role } from '../db/tables';
import type { Viewer } from './viewer';

type Guarded = Pick<APIContext, 'locals'>;

/** Marks a route as meant for everybody. Returns the viewer, or null for a visitor. */
export function openToAll(context: Guarded): Viewer | null {
  return context.locals.viewer;
}

/** The signed-in person; throws `SignInNeeded`. */
export function requirePerson(context: Guarded): Viewer {
  const viewer = context.locals.viewer;
  if (!viewer) throw new SignInNeeded();
  return viewer;
}

const RANK: Record<Role, number> = { operator: 0, coordinator: 1, administrator: 2 };

/** A person of this role or one above it; throws `SignInNeeded` or `Forbidden`. */
export function requireRole(context: Guarded, role: Exclude<Role, 'operator'>): Viewer {
  const viewer = requirePerson(context);
  if (RANK[viewer.role] < RANK[role]) {
    throw new Forbidden(`This page is for ${role}s.`);
  }
  return viewer;
}
