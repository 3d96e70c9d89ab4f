import type { Role } from '../db/tables';

/** The signed-in person as pages and use cases see them. */
export interface Viewer {
  id: string;
  email: string;
  name: string;
  role: Role;
  timeZone: string;
}
