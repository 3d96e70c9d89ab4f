import { z } from 'zod';
import { PASSWORD_MIN_LENGTH } from '../../domain/people/password';
import { isTimeZone } from '../../domain/time/zoneName';
import { COMMON_PASSWORDS } from './commonPasswords';

/** A plain mail address in lower case. Nothing in it can end a mail header or name a second person. */
export const emailField = z
  .string({ error: 'Enter your mail address.' })
  .trim()
  .toLowerCase()
  .min(1, 'Enter your mail address.')
  .max(254, 'A mail address has at most 254 characters.')
  .regex(
    /^[a-z0-9.!#$%&'*+/=?^_`{|}~-]{1,64}@[a-z0-9](?:[a-z0-9-]*[a-z0-9])?(?:\.[a-z0-9](?:[a-z0-9-]*[a-z0-9])?)+$/,
    'That is not a mail address such as name@station.example.',
  );

export const nameField = z
  .string({ error: 'Enter your name.' })
  .transform((name) => name.replace(/\s+/gu, ' ').trim())
  .pipe(
    z
      .string()
      .min(1, 'Enter your name.')
      .max(80, 'A name has at most 80 characters.')
      .regex(/^[^\p{Cc}\p{Cf}<>]*$/u, 'A name has no control characters and no angle brackets.'),
  );

export const timeZoneField = z
  .string({ error: 'Choose your time zone.' })
  .trim()
  .refine(isTimeZone, 'Choose a time zone from the list, such as Europe/Berlin.');

export const passwordField = z
  .string({ error: 'Enter a password.' })
  .min(PASSWORD_MIN_LENGTH, `A password needs at least ${PASSWORD_MIN_LENGTH} characters.`)
  .max(200, 'A password has at most 200 characters.')
  .refine(
    (password) => !COMMON_PASSWORDS.has(password.toLowerCase()),
    'That password is one of the first that anybody would try. Choose another.',
  );

/** A password that is only compared: whatever was typed. */
export const givenPasswordField = z
  .string({ error: 'Enter your password.' })
  .min(1, 'Enter your password.')
  .max(200, 'A password has at most 200 characters.');
