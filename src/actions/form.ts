import type { ActionAPIContext } from 'astro:actions';
import { defineAction } from 'astro:actions';
import type { z } from 'zod';
import { AppError, Conflict, TooManyRequests, type FieldProblem } from '../server/errors';
import { failureOf } from '../server/http/failure';
import { checked } from '../server/http/respond';
import { log } from '../server/log';

/** What became of a form. A refused one carries what was typed, except passwords. */
export type FormOutcome<T> =
  | { ok: true; data: T }
  | {
      ok: false;
      status: number;
      message: string;
      fields: FieldProblem[];
      values: Record<string, string>;
      retryAfterS?: number;
      /** What a conflict says beside its sentence, such as other slots. */
      details?: Record<string, unknown>;
    };

/**
 * An action behind an HTML form: checks the fields, runs `handle`, and turns whatever is thrown into an
 * outcome that the page shows beside the fields. `handle` calls its guard first.
 */
export function formAction<S extends z.ZodType, T>(
  schema: S,
  handle: (input: z.output<S>, context: ActionAPIContext) => Promise<T>,
) {
  return defineAction({
    accept: 'form',
    handler: async (form: FormData, context): Promise<FormOutcome<T>> => {
      const values = textFields(form);
      try {
        return { ok: true, data: await handle(checked(schema, values), context) };
      } catch (error) {
        return refused(error, values, context.locals.requestId);
      }
    },
  });
}

function textFields(form: FormData): Record<string, string> {
  const texts = [...form].filter(
    (entry): entry is [string, string] => typeof entry[1] === 'string',
  );
  return Object.fromEntries(texts);
}

function refused(
  error: unknown,
  values: Record<string, string>,
  requestId: string,
): FormOutcome<never> {
  const { status, sentence } = failureOf(error, requestId);
  if (!(error instanceof AppError)) log.error({ requestId, err: error }, 'form failed');
  const kept = Object.entries(values).filter(([name]) => !/password/i.test(name));
  return {
    ok: false,
    status,
    message: sentence,
    fields: error instanceof AppError ? error.fields : [],
    values: Object.fromEntries(kept),
    ...(error instanceof Conflict ? { details: error.details } : {}),
    ...(error instanceof TooManyRequests ? { retryAfterS: error.retryAfterS } : {}),
  };
}
