import type { ActionAPIContext } from 'astro:actions';
import { z } from 'zod';
import { openToAll, requirePerson } from '../server/auth/guards';
import { answerByLink } from '../server/guests/answerByLink';
import { mailFreshLink } from '../server/guests/mailFreshLink';
import { endMail } from '../server/guests/noMore';
import { guestOfferFormSchema } from '../server/guests/offerForm';
import { reportByLink } from '../server/guests/reportByLink';
import { sayByLink } from '../server/guests/sayByLink';
import { limitsSchema, saveLimits } from '../server/guests/saveLimits';
import { clientKey } from '../server/http/clientAddress';
import { limitRate } from '../server/http/rateLimit';
import { services } from '../server/services';
import { acceptSked } from '../server/skeds/acceptSked';
import { cancelSked } from '../server/skeds/cancelSked';
import { declineSked } from '../server/skeds/declineSked';
import { dropOutSked } from '../server/skeds/dropOutSked';
import { moveSked } from '../server/skeds/moveSked';
import { messageSchema } from '../server/skeds/postMessage';
import { offerSked } from '../server/skeds/offerSked';
import { skedAnswerSchema, skedMoveFormSchema, skedReportSchema } from '../server/skeds/schemas';
import { withdrawSked } from '../server/skeds/withdrawSked';
import { paths } from '../paths';
import { formAction } from './form';

const secretField = z.string().min(1).max(200);
const bySecret = z.object({ secret: secretField });
/** `id`: the sked that the page showed; a link to another one does not answer it. */
const answered = bySecret.extend({ id: z.string().min(1).max(64) });
const answerForm = answered.extend(skedAnswerSchema.shape);
const reportForm = answered.extend(skedReportSchema.shape);

/** A secret cannot be guessed; this only keeps a client from trying without end. */
async function limitLinks(context: ActionAPIContext): Promise<void> {
  await limitRate('guest/client', clientKey(context), services().config.signInAttemptsPerMinute);
}

/** Where a taken answer leads; `done` makes the page say what has happened. */
function done(path: string, what: string): { goTo: string } {
  return { goTo: `${path}?done=${what}` };
}

/** What somebody without an account does behind a link from a mail. Nobody is signed in by it. */
export const guests = {
  accept: formAction(answerForm, async ({ secret, id, ...answer }, context) => {
    openToAll(context);
    await limitLinks(context);
    const next = await answerByLink(services(), { secret, id }, (viewer, link) =>
      acceptSked(services(), viewer, id, { ...answer, ...link }),
    );
    return done(next, 'accepted');
  }),

  decline: formAction(answerForm, async ({ secret, id, ...answer }, context) => {
    openToAll(context);
    await limitLinks(context);
    const next = await answerByLink(services(), { secret, id }, (viewer, link) =>
      declineSked(services(), viewer, id, { ...answer, ...link }),
    );
    return done(next, 'declined');
  }),

  dropOut: formAction(answerForm, async ({ secret, id, ...answer }, context) => {
    openToAll(context);
    await limitLinks(context);
    const next = await answerByLink(services(), { secret, id }, (viewer, link) =>
      dropOutSked(services(), viewer, id, { ...answer, ...link }),
    );
    return done(next, 'dropped-out');
  }),

  withdraw: formAction(answerForm, async ({ secret, id, ...answer }, context) => {
    openToAll(context);
    await limitLinks(context);
    const next = await answerByLink(services(), { secret, id }, (viewer, link) =>
      withdrawSked(services(), viewer, id, { ...answer, ...link }),
    );
    return done(next, 'withdrawn');
  }),

  cancel: formAction(answerForm, async ({ secret, id, ...answer }, context) => {
    openToAll(context);
    await limitLinks(context);
    const next = await answerByLink(services(), { secret, id }, (viewer, link) =>
      cancelSked(services(), viewer, id, { ...answer, ...link }),
    );
    return done(next, 'cancelled');
  }),

  move: formAction(
    z.intersection(answered, skedMoveFormSchema),
    async ({ secret, id, ...move }, context) => {
      openToAll(context);
      await limitLinks(context);
      const next = await answerByLink(services(), { secret, id }, (viewer, link) =>
        moveSked(services(), viewer, id, { ...move, ...link }),
      );
      return done(next, 'moved');
    },
  ),

  report: formAction(reportForm, async ({ secret, id, ...said }, context) => {
    openToAll(context);
    await limitLinks(context);
    return done(await reportByLink(services(), { secret, id }, said), 'reported');
  }),

  say: formAction(
    answered.extend(messageSchema.shape),
    async ({ secret, id, ...said }, context) => {
      openToAll(context);
      await limitLinks(context);
      return done(await sayByLink(services(), { secret, id }, said), 'said');
    },
  ),

  limits: formAction(z.intersection(bySecret, limitsSchema), async (input, context) => {
    openToAll(context);
    await limitLinks(context);
    const next = await saveLimits(services(), input.secret, input);
    return { goTo: `${next}/move?done=limits` };
  }),

  freshLink: formAction(bySecret, async ({ secret }, context) => {
    openToAll(context);
    await limitLinks(context);
    await limitRate('guest/link', secret, 1);
    await mailFreshLink(services(), secret);
    return {};
  }),

  noMore: formAction(
    z.object({ token: z.string().min(1).max(200) }),
    async ({ token }, context) => {
      openToAll(context);
      await limitLinks(context);
      await endMail(services(), token);
      return {};
    },
  ),

  offer: formAction(guestOfferFormSchema, async (input, context) => {
    const viewer = requirePerson(context);
    const { id } = await offerSked(services(), viewer, input);
    return { goTo: `${paths.sked(id)}?done=offered` };
  }),
};
