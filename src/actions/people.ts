import type { ActionAPIContext } from 'astro:actions';
import { z } from 'zod';
import { mailPreferenceFormSchema } from '../domain/people/mailPreferenceForm';
import { openToAll, requirePerson, requireRole } from '../server/auth/guards';
import { isKnownBrowser, rememberBrowser } from '../server/auth/knownBrowser';
import { SignInRefused, signInByLink, signInByPassword, signOut } from '../server/auth/session';
import { Forbidden, InvalidInput } from '../server/errors';
import { clientKey } from '../server/http/clientAddress';
import { evenTime } from '../server/http/evenTime';
import { limitRate } from '../server/http/rateLimit';
import { safeReturnPath } from '../server/http/returnPath';
import { changePassword } from '../server/people/changePassword';
import { emailField, givenPasswordField, passwordField } from '../server/people/fields';
import { lockPerson } from '../server/people/lockPerson';
import { registerPerson, registrationSchema } from '../server/people/registerPerson';
import { requestPasswordReset } from '../server/people/requestPasswordReset';
import { requestSignInLink } from '../server/people/requestSignInLink';
import { resetPassword } from '../server/people/resetPassword';
import { saveMailPreference } from '../server/people/saveMailPreference';
import { roleField, setRole } from '../server/people/setRole';
import { signOutEverywhere } from '../server/people/signOutEverywhere';
import { peekToken } from '../server/people/tokens';
import { unlockPerson } from '../server/people/unlockPerson';
import { profileSchema, updateProfile } from '../server/people/updateProfile';
import { services } from '../server/services';
import { listMyStations } from '../server/stations/listMyStations';
import { paths } from '../paths';
import { formAction } from './form';

/** No answer about an address comes sooner, so that its time tells nothing. */
const EVEN_MS = 400;
/** Mails to one address within a minute, whoever asks for them. */
const MAILS_PER_MINUTE = 3;

const secretField = z.string().min(1).max(200);

async function limitMails(context: ActionAPIContext, email: string): Promise<void> {
  await limitRate('mail/client', clientKey(context), services().config.signInAttemptsPerMinute);
  await limitRate('mail/address', email, MAILS_PER_MINUTE);
}

async function limitSignIn(context: ActionAPIContext, email: string): Promise<void> {
  const perMinute = services().config.signInAttemptsPerMinute;
  await limitRate('signIn/client', clientKey(context), perMinute);
  if (isKnownBrowser(context.cookies, email)) await limitRate('signIn/known', email, perMinute);
  else await limitRate('signIn/account', email, perMinute * 3);
}

async function limitLinks(context: ActionAPIContext): Promise<void> {
  await limitRate('link/client', clientKey(context), services().config.signInAttemptsPerMinute);
}

function inWords(error: unknown): unknown {
  if (!(error instanceof SignInRefused)) return error;
  if (error.reason === 'wrong') {
    return new InvalidInput(
      'This address and this password do not belong together, or the address is not confirmed yet.',
    );
  }
  if (error.reason === 'locked') {
    return new Forbidden('This account is locked. Ask an administrator of this service why.');
  }
  return error.reason;
}

async function enterByLink(
  context: ActionAPIContext,
  given: Parameters<typeof signInByLink>[1],
): Promise<void> {
  const { email } = await peekToken(services(), given.secret, given.purpose);
  try {
    await signInByLink(context, given);
  } catch (error) {
    throw inWords(error);
  }
  if (email !== undefined) rememberBrowser(context.cookies, email);
}

export const people = {
  register: formAction(registrationSchema, async (input, context) => {
    openToAll(context);
    await limitMails(context, input.email);
    await evenTime(EVEN_MS, () => registerPerson(services(), input));
    return { email: input.email };
  }),

  confirmMail: formAction(
    z.object({ secret: secretField, password: passwordField }),
    async (input, context) => {
      openToAll(context);
      await limitLinks(context);
      const { personId = '' } = await peekToken(services(), input.secret, 'confirmMail');
      await enterByLink(context, { ...input, purpose: 'confirmMail' });
      // Whoever has answered without an account finds the skeds so far.
      const stations = await listMyStations(services(), { id: personId });
      return { goTo: stations.length > 0 ? `${paths.skeds}?done=registered` : paths.newStation };
    },
  ),

  signIn: formAction(
    z.object({ email: emailField, password: givenPasswordField, next: z.string().optional() }),
    async ({ email, password, next }, context) => {
      openToAll(context);
      await limitSignIn(context, email);
      try {
        await signInByPassword(context, { email, password });
      } catch (error) {
        throw inWords(error);
      }
      rememberBrowser(context.cookies, email);
      return { goTo: safeReturnPath(next) ?? paths.home };
    },
  ),

  requestSignInLink: formAction(z.object({ email: emailField }), async ({ email }, context) => {
    openToAll(context);
    await limitMails(context, email);
    await evenTime(EVEN_MS, () => requestSignInLink(services(), email));
    return { email };
  }),

  useSignInLink: formAction(z.object({ secret: secretField }), async ({ secret }, context) => {
    openToAll(context);
    await limitLinks(context);
    await enterByLink(context, { secret, purpose: 'signIn' });
    return { goTo: paths.home };
  }),

  requestPasswordReset: formAction(z.object({ email: emailField }), async ({ email }, context) => {
    openToAll(context);
    await limitMails(context, email);
    await evenTime(EVEN_MS, () => requestPasswordReset(services(), email));
    return { email };
  }),

  resetPassword: formAction(
    z.object({ secret: secretField, password: passwordField }),
    async (input, context) => {
      openToAll(context);
      await limitLinks(context);
      await resetPassword(services(), input);
      await signOut(context);
      return { goTo: `${paths.signIn}?changed=password` };
    },
  ),

  updateProfile: formAction(profileSchema, async (input, context) => {
    const viewer = requirePerson(context);
    await updateProfile(services(), viewer, input);
    return { goTo: `${paths.account}?saved=profile` };
  }),

  saveMailPreference: formAction(mailPreferenceFormSchema, async (preference, context) => {
    const viewer = requirePerson(context);
    await saveMailPreference(services(), viewer, preference);
    return { goTo: `${paths.accountMail}?saved` };
  }),

  changePassword: formAction(
    z.object({ currentPassword: givenPasswordField, newPassword: passwordField }),
    async (input, context) => {
      const viewer = requirePerson(context);
      await limitRate('password', viewer.id, services().config.signInAttemptsPerMinute);
      await changePassword(services(), viewer, input);
      await signInByPassword(context, { email: viewer.email, password: input.newPassword });
      return { goTo: `${paths.account}?saved=password` };
    },
  ),

  signOutEverywhere: formAction(z.object({}), async (_input, context) => {
    const viewer = requirePerson(context);
    await signOutEverywhere(services(), viewer);
    await signOut(context);
    return { goTo: `${paths.signIn}?changed=sessions` };
  }),

  setRole: formAction(
    z.object({ personId: z.string(), role: roleField }),
    async (input, context) => {
      const viewer = requireRole(context, 'administrator');
      await setRole(services(), viewer, input);
      return { personId: input.personId };
    },
  ),

  lock: formAction(z.object({ personId: z.string() }), async ({ personId }, context) => {
    const viewer = requireRole(context, 'administrator');
    await lockPerson(services(), viewer, personId);
    return { personId };
  }),

  unlock: formAction(z.object({ personId: z.string() }), async ({ personId }, context) => {
    const viewer = requireRole(context, 'administrator');
    await unlockPerson(services(), viewer, personId);
    return { personId };
  }),
};
