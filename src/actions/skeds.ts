import { z } from 'zod';
import { requirePerson } from '../server/auth/guards';
import { services } from '../server/services';
import { acceptSked } from '../server/skeds/acceptSked';
import { cancelSked } from '../server/skeds/cancelSked';
import { declineSked } from '../server/skeds/declineSked';
import { dropOutSked } from '../server/skeds/dropOutSked';
import { moveSked } from '../server/skeds/moveSked';
import { messageSchema, postMessage } from '../server/skeds/postMessage';
import { reportSked } from '../server/skeds/reportSked';
import { skedAnswerSchema, skedMoveFormSchema, skedReportSchema } from '../server/skeds/schemas';
import { setSheet, sheetSettingsFormSchema } from '../server/skeds/setSheet';
import { withdrawSked } from '../server/skeds/withdrawSked';
import { paths } from '../paths';
import { formAction } from './form';

const skedId = z.object({ id: z.string().min(1).max(64) });
const answerForm = skedId.extend(skedAnswerSchema.shape);

/** Where a taken answer leads; `done` makes the page say what has happened. */
function done(id: string, what: string): { goTo: string } {
  return { goTo: `${paths.sked(id)}?done=${what}` };
}

export const skeds = {
  accept: formAction(answerForm, async ({ id, ...answer }, context) => {
    const viewer = requirePerson(context);
    await acceptSked(services(), viewer, id, answer);
    return done(id, 'accepted');
  }),

  decline: formAction(answerForm, async ({ id, ...answer }, context) => {
    const viewer = requirePerson(context);
    await declineSked(services(), viewer, id, answer);
    return done(id, 'declined');
  }),

  dropOut: formAction(answerForm, async ({ id, ...answer }, context) => {
    const viewer = requirePerson(context);
    await dropOutSked(services(), viewer, id, answer);
    return done(id, 'dropped-out');
  }),

  withdraw: formAction(answerForm, async ({ id, ...answer }, context) => {
    const viewer = requirePerson(context);
    await withdrawSked(services(), viewer, id, answer);
    return done(id, 'withdrawn');
  }),

  cancel: formAction(answerForm, async ({ id, ...answer }, context) => {
    const viewer = requirePerson(context);
    await cancelSked(services(), viewer, id, answer);
    return done(id, 'cancelled');
  }),

  move: formAction(skedMoveFormSchema, async ({ id, ...move }, context) => {
    const viewer = requirePerson(context);
    await moveSked(services(), viewer, id, move);
    return done(id, 'moved');
  }),

  report: formAction(skedId.extend(skedReportSchema.shape), async ({ id, ...said }, context) => {
    const viewer = requirePerson(context);
    await reportSked(services(), viewer, id, said);
    return done(id, 'reported');
  }),

  setSheet: formAction(sheetSettingsFormSchema, async ({ id, first, convention }, context) => {
    const viewer = requirePerson(context);
    await setSheet(services(), viewer, id, { eastFirst: first === 'east', convention });
    return { goTo: `${paths.skedSheet(id)}?done=set` };
  }),

  say: formAction(skedId.extend(messageSchema.shape), async ({ id, ...message }, context) => {
    const viewer = requirePerson(context);
    await postMessage(services(), viewer, id, message);
    return { goTo: `${paths.sked(id)}?done=said#talk` };
  }),
};
