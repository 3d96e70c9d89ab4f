import { beginDraft } from '../server/activities/beginDraft';
import { dropDraft } from '../server/activities/dropDraft';
import { publishRevision, publishSchema } from '../server/activities/publishRevision';
import { z } from 'zod';
import { activitySettingsSchema, nestedFields } from '../domain/activity/settings';
import { openToAll, requirePerson, requireRole } from '../server/auth/guards';
import { askForPlan, askForPlanSchema } from '../server/activities/askForPlan';
import { createActivity } from '../server/activities/createActivity';
import { giveBackByLink, giveBackSchema } from '../server/activities/giveBackByLink';
import { inviteGuest, guestInvitationSchema } from '../server/activities/inviteGuest';
import { inviteStation } from '../server/activities/inviteStation';
import { mailFreshLink } from '../server/activities/mailFreshLink';
import { moveOnRoster } from '../server/activities/moveOnRoster';
import { remindRoster } from '../server/activities/remindRoster';
import { removeFromRoster } from '../server/activities/removeFromRoster';
import { saveAnswer } from '../server/activities/saveAnswer';
import { saveAnswerByLink } from '../server/activities/saveAnswerByLink';
import { stopPlan } from '../server/activities/stopPlan';
import { updateActivity } from '../server/activities/updateActivity';
import { clientKey } from '../server/http/clientAddress';
import { limitRate } from '../server/http/rateLimit';
import { checked } from '../server/http/respond';
import { services } from '../server/services';
import { paths } from '../paths';
import { formAction } from './form';

/** Mails that one coordinator can make the server write within a minute. */
const INVITATIONS_PER_MINUTE = 60;
const FRESH_LINKS_PER_MINUTE = 3;

const formFields = z.record(z.string(), z.string());
const onRoster = z.object({
  slug: z.string().min(1).max(80),
  stationId: z.string().min(1).max(64),
});

function rosterDone(slug: string, what: string, callSign = ''): { goTo: string } {
  const said = new URLSearchParams({ done: what, ...(callSign ? { of: callSign } : {}) });
  return { goTo: `${paths.activityRoster(slug)}?${said.toString()}` };
}

/** Fields beside the settings that say which activity is meant. */
function settingsIn({ slug: _slug, version: _version, ...fields }: Record<string, string>) {
  return checked(activitySettingsSchema, nestedFields(fields));
}

const ofActivity = z.object({ slug: z.string().max(200) });

export const activities = {
  create: formAction(formFields, async (fields, context) => {
    const viewer = requireRole(context, 'coordinator');
    const { slug } = await createActivity(services(), viewer, settingsIn(fields));
    return rosterDone(slug, 'created');
  }),

  update: formAction(formFields, async (fields, context) => {
    const viewer = requireRole(context, 'coordinator');
    const slug = fields['slug'] ?? '';
    const version = Number(fields['version']);
    await updateActivity(services(), viewer, slug, version, settingsIn(fields));
    return { goTo: `${paths.activitySettings(slug)}?done=saved` };
  }),

  inviteStation: formAction(onRoster, async ({ slug, stationId }, context) => {
    const viewer = requireRole(context, 'coordinator');
    await limitRate('roster/invite', viewer.id, INVITATIONS_PER_MINUTE);
    const { callSign } = await inviteStation(services(), viewer, slug, stationId);
    return rosterDone(slug, 'invited', callSign);
  }),

  inviteGuest: formAction(formFields, async ({ slug = '', ...fields }, context) => {
    const viewer = requireRole(context, 'coordinator');
    await limitRate('roster/invite', viewer.id, INVITATIONS_PER_MINUTE);
    const given = checked(guestInvitationSchema, nestedFields(fields));
    const { callSign } = await inviteGuest(services(), viewer, slug, given);
    return rosterDone(slug, 'invited', callSign);
  }),

  remove: formAction(onRoster, async ({ slug, stationId }, context) => {
    const viewer = requireRole(context, 'coordinator');
    const { callSign } = await removeFromRoster(services(), viewer, slug, stationId);
    return rosterDone(slug, 'removed', callSign);
  }),

  move: formAction(
    onRoster.extend({
      place: z.coerce
        .number({ error: 'A number on the roster is a whole number.' })
        .int('A number on the roster is a whole number.')
        .min(1, 'Numbers on the roster begin with 1.'),
    }),
    async ({ slug, stationId, place }, context) => {
      const viewer = requireRole(context, 'coordinator');
      await moveOnRoster(services(), viewer, slug, stationId, place);
      return rosterDone(slug, 'moved');
    },
  ),

  remind: formAction(z.object({ slug: z.string() }), async ({ slug }, context) => {
    const viewer = requireRole(context, 'coordinator');
    const { reminded } = await remindRoster(services(), viewer, slug);
    return rosterDone(slug, 'reminded', String(reminded));
  }),

  askForPlan: formAction(
    askForPlanSchema.extend({ slug: z.string() }),
    async ({ slug, how }, context) => {
      const viewer = requireRole(context, 'coordinator');
      await askForPlan(services(), viewer, slug, { how });
      return { goTo: paths.activityPlan(slug) };
    },
  ),

  stopPlan: formAction(z.object({ slug: z.string() }), async ({ slug }, context) => {
    const viewer = requireRole(context, 'coordinator');
    await stopPlan(services(), viewer, slug);
    return { goTo: paths.activityPlan(slug) };
  }),

  answer: formAction(formFields, async ({ slug = '', stationId = '', ...fields }, context) => {
    const viewer = requirePerson(context);
    const { answer } = await saveAnswer(services(), viewer, slug, stationId, fields);
    return { goTo: `${paths.activityAnswer(slug, stationId)}&done=${answer}` };
  }),

  answerByLink: formAction(
    formFields,
    async ({ secret = '', stationId = '', ...fields }, context) => {
      openToAll(context);
      await limitRate('link/client', clientKey(context), 30);
      const saved = await saveAnswerByLink(services(), secret, stationId, fields);
      const said = new URLSearchParams({ station: stationId, done: saved.answer });
      return { goTo: `${paths.rosterAnswer(saved.secret)}?${said.toString()}` };
    },
  ),

  giveBackByLink: formAction(
    giveBackSchema.extend({ secret: z.string().max(200) }),
    async ({ secret, ...slot }, context) => {
      openToAll(context);
      await limitRate('link/client', clientKey(context), 30);
      const fresh = await giveBackByLink(services(), secret, slot);
      return { goTo: `${paths.rosterAnswer(fresh.secret)}?done=givenBack` };
    },
  ),

  freshLink: formAction(z.object({ secret: z.string().max(200) }), async ({ secret }, context) => {
    openToAll(context);
    await limitRate('mail/client', clientKey(context), FRESH_LINKS_PER_MINUTE);
    await mailFreshLink(services(), secret);
    return { mailed: true };
  }),

  publish: formAction(
    publishSchema.extend(ofActivity.shape),
    async ({ slug, ...input }, context) => {
      const viewer = requireRole(context, 'coordinator');
      const { number } = await publishRevision(services(), viewer, slug, input);
      return { goTo: `${paths.activity(slug)}?done=published${number}` };
    },
  ),

  beginDraft: formAction(ofActivity, async ({ slug }, context) => {
    const viewer = requireRole(context, 'coordinator');
    await beginDraft(services(), viewer, slug);
    return { goTo: paths.activityTimetable(slug) };
  }),

  dropDraft: formAction(ofActivity, async ({ slug }, context) => {
    const viewer = requireRole(context, 'coordinator');
    await dropDraft(services(), viewer, slug);
    return { goTo: paths.activityPlan(slug) };
  }),
};
