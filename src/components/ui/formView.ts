import type { Problem } from './Notices';

/** What a form on a page shows beside its fields: what was typed and what is wrong with it. */
export interface FormView {
  problems: Problem[];
  /** The problem of one field. */
  error: (name: string) => string | undefined;
  /** What was typed, or `fallback` on the first visit. */
  value: (name: string, fallback?: string) => string;
}
