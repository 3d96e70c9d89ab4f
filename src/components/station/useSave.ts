import { useEffect, useState } from 'react';
import type { z } from 'zod';
import type { Problem } from '../ui/Notices';

interface FieldProblem {
  path: string;
  message: string;
}

type Answer<T> = { ok: true; body: T } | { ok: false; message: string; fields: FieldProblem[] };

/** Id of the field that holds the value at `path` ("sky.blocked.0.azimuthToDeg"). */
export function fieldId(path: string): string {
  return `field-${path.replaceAll('.', '-')}`;
}

/** Sends JSON and reads JSON; never throws. */
export async function sendJson<T>(
  method: 'POST' | 'PUT' | 'DELETE',
  url: string,
  body?: unknown,
): Promise<Answer<T>> {
  try {
    const response = await fetch(url, {
      method,
      headers: { 'content-type': 'application/json', accept: 'application/json' },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
    const answer = (await response.json()) as {
      error?: { message: string; fields?: FieldProblem[] };
    };
    if (response.ok) return { ok: true, body: answer as T };
    return {
      ok: false,
      message: answer.error?.message ?? `The server answered with ${response.status}.`,
      fields: answer.error?.fields ?? [],
    };
  } catch {
    return {
      ok: false,
      message: 'The server could not be reached. What you entered is still here; save it again.',
      fields: [],
    };
  }
}

interface Save<T> {
  saving: boolean;
  /** For the top of the form. */
  problems: Problem[];
  /** For the field at that path. */
  errorOf: (path: string) => string | undefined;
  /** Checks with the schema, sends, and gives the answer, or null after a problem. */
  save: (body: unknown) => Promise<T | null>;
}

/** Checks and saves a form; keeps the problems by field. */
export function useSave<T>(method: 'POST' | 'PUT', url: string, schema: z.ZodType): Save<T> {
  const [saving, setSaving] = useState(false);
  const [failure, setFailure] = useState<{ message: string; fields: FieldProblem[] } | null>(null);

  useEffect(() => {
    if (failure) document.querySelector<HTMLElement>('.notice--problem')?.focus();
  }, [failure]);

  const save = async (body: unknown): Promise<T | null> => {
    const checked = schema.safeParse(body);
    if (!checked.success) {
      setFailure({
        message: '',
        fields: checked.error.issues.map((issue) => ({
          path: issue.path.map(String).join('.'),
          message: issue.message,
        })),
      });
      return null;
    }
    setSaving(true);
    const answer = await sendJson<T>(method, url, body);
    setSaving(false);
    setFailure(answer.ok ? null : answer);
    return answer.ok ? answer.body : null;
  };

  const fields = failure?.fields ?? [];
  const problems: Problem[] =
    fields.length > 0
      ? fields.map(({ path, message }) => ({ fieldId: fieldId(path), message }))
      : failure
        ? [{ message: failure.message }]
        : [];
  return {
    saving,
    save,
    problems,
    errorOf: (path) => fields.find((field) => field.path === path)?.message,
  };
}

/** Asks before the page is left with something unsaved. */
export function useUnsavedWarning(unsaved: boolean): void {
  useEffect(() => {
    if (!unsaved) return;
    const warn = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', warn);
    return () => window.removeEventListener('beforeunload', warn);
  }, [unsaved]);
}
