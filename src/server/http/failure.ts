import { AppError, TooManyRequests } from '../errors';

/** What an error page says. */
export interface Failure {
  status: number;
  title: string;
  sentence: string;
  requestId: string;
  retryAfterS?: number;
}

const TITLES: Record<number, string> = {
  400: 'That could not be read',
  401: 'Sign in first',
  403: 'Not open to you',
  404: 'Nothing is here',
  405: 'That cannot be done here',
  409: 'That no longer fits',
  413: 'Too large',
  415: 'That type is not read here',
  421: 'Wrong address',
  429: 'Too many at once',
};

/** The one mapper from a thrown error to what a page says about it. */
export function failureOf(error: unknown, requestId: string): Failure {
  if (error instanceof AppError) {
    return {
      status: error.status,
      title: TITLES[error.status] ?? 'That did not work',
      sentence: error.message,
      requestId,
      ...(error instanceof TooManyRequests ? { retryAfterS: error.retryAfterS } : {}),
    };
  }
  return {
    status: 500,
    title: 'Something broke on our side',
    sentence: requestId
      ? `The page could not be made. Quote ${requestId} when you report it.`
      : 'The page could not be made. Try again in a minute.',
    requestId,
  };
}
