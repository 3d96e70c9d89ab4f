/** One problem with one field: `path` in dots ("stations.0.site.locator"), `message` a sentence for a person. */
export interface FieldProblem {
  path: string;
  message: string;
}

/** An error meant for a person. Everything else that is thrown is a fault of ours and becomes a plain 500. */
export abstract class AppError extends Error {
  abstract readonly code: string;
  abstract readonly status: number;
  readonly fields: FieldProblem[];

  constructor(message: string, fields: FieldProblem[] = []) {
    super(message);
    this.name = new.target.name;
    this.fields = fields;
  }
}

export class InvalidInput extends AppError {
  readonly code = 'invalidInput';
  readonly status = 400;
}

export class SignInNeeded extends AppError {
  readonly code = 'signInNeeded';
  readonly status = 401;
  constructor(message = 'Sign in first.') {
    super(message);
  }
}

export class Forbidden extends AppError {
  readonly code = 'forbidden';
  readonly status = 403;
}

export class NotFound extends AppError {
  readonly code = 'notFound';
  readonly status = 404;
}

/** What was asked does not fit the present state: `details` may carry alternatives. */
export class Conflict extends AppError {
  readonly code = 'conflict';
  readonly status = 409;
  constructor(
    message: string,
    readonly details: Record<string, unknown> = {},
  ) {
    super(message);
  }
}

export class BodyTooLarge extends AppError {
  readonly code = 'bodyTooLarge';
  readonly status = 413;
}

export class UnsupportedType extends AppError {
  readonly code = 'unsupportedType';
  readonly status = 415;
}

export class WrongHost extends AppError {
  readonly code = 'wrongHost';
  readonly status = 421;
}

export class TooManyRequests extends AppError {
  readonly code = 'tooManyRequests';
  readonly status = 429;
  constructor(
    message: string,
    readonly retryAfterS: number,
  ) {
    super(message);
  }
}
