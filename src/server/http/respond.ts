import type { APIContext } from 'astro';
import type { z } from 'zod';
import {
  AppError,
  BodyTooLarge,
  Conflict,
  InvalidInput,
  TooManyRequests,
  UnsupportedType,
  type FieldProblem,
} from '../errors';
import { log } from '../log';

const MAX_JSON_BYTES = 1_000_000;

export function json(body: unknown, status = 200, headers: Record<string, string> = {}): Response {
  return new Response(JSON.stringify(body), {
    status,
    headers: {
      'content-type': 'application/json; charset=utf-8',
      'cache-control': 'no-store',
      ...headers,
    },
  });
}

/** The one mapper from a thrown error to an answer of the API. */
export function errorToJson(error: unknown, requestId: string): Response {
  if (error instanceof AppError) {
    const headers: Record<string, string> =
      error instanceof TooManyRequests ? { 'retry-after': String(error.retryAfterS) } : {};
    return json(
      {
        error: {
          code: error.code,
          message: error.message,
          fields: error.fields,
          ...(error instanceof Conflict ? error.details : {}),
        },
      },
      error.status,
      headers,
    );
  }
  log.error({ requestId, err: error }, 'request failed');
  return json(
    {
      error: {
        code: 'internal',
        message: `Something broke on our side. Quote ${requestId} when you report it.`,
        fields: [],
      },
    },
    500,
  );
}

/** Wraps an endpoint so that whatever it throws becomes an answer. */
export function endpoint(
  handle: (context: APIContext) => Promise<Response>,
): (context: APIContext) => Promise<Response> {
  return async (context) => {
    try {
      return await handle(context);
    } catch (error) {
      return errorToJson(error, context.locals.requestId);
    }
  };
}

/** Reads and checks a JSON body. Throws `UnsupportedType`, `BodyTooLarge` or `InvalidInput`. */
export async function readJson<T extends z.ZodType>(
  request: Request,
  schema: T,
): Promise<z.output<T>> {
  const type = request.headers.get('content-type') ?? '';
  if (!/^application\/json\b/i.test(type)) {
    throw new UnsupportedType('Send the body as application/json.');
  }
  const text = await readText(request, MAX_JSON_BYTES);
  let body: unknown;
  try {
    body = JSON.parse(text);
  } catch {
    throw new InvalidInput('The body is not valid JSON.');
  }
  return checked(schema, body);
}

/** The body as text; throws `BodyTooLarge` as soon as more than `maxBytes` have come. */
export async function readText(request: Request, maxBytes: number): Promise<string> {
  return (await readBytes(request, maxBytes)).toString('utf8');
}

/** The body as it came; throws `BodyTooLarge` as soon as more than `maxBytes` have come. */
export async function readBytes(request: Request, maxBytes: number): Promise<Buffer> {
  const tooLarge = new BodyTooLarge(
    `The body is larger than ${Math.floor(maxBytes / 1000)} kB, the most that is read here.`,
  );
  if (Number(request.headers.get('content-length') ?? 0) > maxBytes) throw tooLarge;
  if (!request.body) return Buffer.alloc(0);
  const chunks: Uint8Array[] = [];
  let size = 0;
  for await (const chunk of request.body as unknown as AsyncIterable<Uint8Array>) {
    size += chunk.byteLength;
    if (size > maxBytes) throw tooLarge;
    chunks.push(chunk);
  }
  return Buffer.concat(chunks);
}

/** Checks a value; throws `InvalidInput` listing every problem with its path. */
export function checked<T extends z.ZodType>(schema: T, value: unknown): z.output<T> {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  throw invalidInputFrom(parsed.error);
}

export function invalidInputFrom(error: z.ZodError): InvalidInput {
  const fields = error.issues.flatMap((issue) => fieldProblems(issue, []));
  const first = fields[0];
  const message = first
    ? `${first.path ? `${first.path}: ` : ''}${first.message}`
    : 'The input is not valid.';
  return new InvalidInput(message, fields);
}

/**
 * One issue as problems with their places. Of a choice between several shapes the one whose fields were meant is told
 * in detail, when only one knows all the fields that were sent.
 */
function fieldProblems(issue: z.core.$ZodIssue, outer: PropertyKey[]): FieldProblem[] {
  const path = [...outer, ...issue.path];
  if (issue.code === 'invalid_union') {
    const meant = issue.errors.filter(
      (branch) =>
        !branch.some(({ code, path }) => code === 'unrecognized_keys' && path.length === 0),
    );
    if (meant.length === 1) return meant[0]!.flatMap((inner) => fieldProblems(inner, path));
  }
  return [{ path: path.map(String).join('.'), message: issue.message }];
}
