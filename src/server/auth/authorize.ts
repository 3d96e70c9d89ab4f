import { CredentialsSignin } from '@auth/core/errors';
import { AppError } from '../errors';
import { checkPassword } from '../people/checkPassword';
import { confirmMail } from '../people/confirmMail';
import { useSignInLink } from '../people/useSignInLink';
import { services } from '../services';

/** Why nobody was signed in, as a sentence. */
export class SignInRefused extends CredentialsSignin {
  constructor(readonly reason: AppError | 'wrong' | 'locked') {
    super();
  }
}

type Given = Partial<Record<string, unknown>>;

const textOf = (value: unknown): string => (typeof value === 'string' ? value : '');

/** Provider "password". */
export async function authorizePassword(given: Given) {
  const check = await checkPassword(services(), {
    email: textOf(given['email']),
    password: textOf(given['password']),
  });
  if (check.outcome !== 'right') throw new SignInRefused(check.outcome);
  return { id: check.person.id };
}

/** Provider "link": a sign-in link, or the link that confirms an address together with the first password. */
export async function authorizeLink(given: Given) {
  const secret = textOf(given['secret']);
  try {
    const person =
      given['purpose'] === 'confirmMail'
        ? await confirmMail(services(), { secret, password: textOf(given['password']) })
        : await useSignInLink(services(), secret);
    return { id: person.id };
  } catch (error) {
    if (error instanceof AppError) throw new SignInRefused(error);
    throw error;
  }
}
