import { AuthError } from '@auth/core/errors';
import { log } from '../log';

/** Auth.js reports every wrong password as an error; here only real faults are. */
export const authLogger = {
  error(error: Error) {
    const expected = error instanceof AuthError && EXPECTED.includes(error.type);
    if (expected) log.debug({ type: error.type }, 'sign-in refused');
    else log.error({ err: error }, 'authentication broke');
  },
  warn(code: string) {
    log.warn({ code }, 'authentication warning');
  },
  debug() {
    // Details would hold what people typed.
  },
};

/** A wrong password, and a cookie that is old, foreign or made with another secret. */
const EXPECTED: readonly string[] = ['CredentialsSignin', 'JWTSessionError', 'SignOutError'];
