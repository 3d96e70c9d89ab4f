import type { AstroGlobal } from 'astro';
import type { Problem } from '../components/ui/Notices';
import type { FormOutcome } from './form';

/** What a page shows of its form: nothing yet, done, or refused with the reasons and what was typed. */
export interface FormState<T> {
  done: T | undefined;
  problems: Problem[];
  /** The problem of one field. */
  error: (name: string) => string | undefined;
  /** What was typed, or `fallback` on the first visit. */
  value: (name: string, fallback?: string) => string;
  /** What a conflict said beside its sentence. */
  details: Record<string, unknown>;
}

interface ActionResult<T> {
  data: FormOutcome<T> | undefined;
  error: { status: number; message: string } | undefined;
}

/**
 * Reads the result of an action on the page that holds its form; ids of fields are their names. Sets the
 * status of the page when the form was refused.
 */
export function formState<T>(
  page: Pick<AstroGlobal, 'response'>,
  result: ActionResult<T> | undefined,
): FormState<T> {
  const outcome = result?.data;
  if (outcome?.ok) return { done: outcome.data, problems: [], ...untouched() };
  if (!outcome) {
    if (!result?.error) return { done: undefined, problems: [], ...untouched() };
    page.response.status = result.error.status;
    return { done: undefined, problems: [{ message: result.error.message }], ...untouched() };
  }
  page.response.status = outcome.status;
  if (outcome.retryAfterS) page.response.headers.set('retry-after', String(outcome.retryAfterS));
  const { fields, values } = outcome;
  return {
    done: undefined,
    problems:
      fields.length > 0
        ? fields.map(({ path, message }) => ({ fieldId: path || undefined, message }))
        : [{ message: outcome.message }],
    error: (name) => fields.find((field) => field.path === name)?.message,
    value: (name, fallback = '') => values[name] ?? fallback,
    details: outcome.details ?? {},
  };
}

function untouched() {
  return { error: () => undefined, value: (_name: string, fallback = '') => fallback, details: {} };
}
