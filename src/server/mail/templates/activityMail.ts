import { bandById } from '../../../domain/station/bands';
import { modeById } from '../../../domain/station/modes';
import {
  formatLocal,
  formatLocalRange,
  formatUtc,
  formatUtcRange,
} from '../../../domain/time/format';
import type { ActivityView } from '../../../domain/activity/views';
import type { MailContent } from '../shell';

export type ActivityMailKind = 'invitation' | 'reminder' | 'freshLink';

interface ActivityMail {
  kind: ActivityMailKind;
  activity: ActivityView;
  to: { timeZone: string };
  /** Call signs for which they answer. */
  callSigns: string[];
  /** Page on which they answer. */
  url: string;
  guest: boolean;
}

/** Invitation to an activity, the reminder to answer it, and a fresh link to the answer. */
export function activityMail(mail: ActivityMail): { subject: string; content: MailContent } {
  const { activity, to, callSigns, url, guest, kind } = mail;
  const stations = listed(callSigns);
  const { title, lead } = opening(kind, activity, stations);
  const own = to.timeZone === 'UTC' ? [] : [formatLocalRange(activity, to.timeZone)];
  const facts: [string, string][] = [
    ['Dates', [formatUtcRange(activity, { withYear: true }), ...own].join('; ')],
    [
      'Bands',
      activity.bands
        .map(({ band, mode }) => `${bandById(band).label} (${modeById(mode).label})`)
        .join(', '),
    ],
    ['Slots', `${activity.slotMinutes} minutes`],
    ['Coordinator', activity.coordinatorName],
  ];
  if (activity.answersByMs !== null) {
    const local =
      to.timeZone === 'UTC' ? '' : `, ${formatLocal(activity.answersByMs, to.timeZone)}`;
    facts.push(['Answer by', `${formatUtc(activity.answersByMs, { withYear: true })}${local}`]);
  }
  const content: MailContent = {
    title,
    paragraphs: [
      lead,
      ...(kind === 'invitation' ? paragraphsOf(activity.invitation) : []),
      guest
        ? 'You need no account. The page asks whether you are coming, on which bands, when, and whom you want to work.'
        : 'The page asks whether you are coming, on which bands, when, and whom you want to work.',
    ],
    facts,
    button: { label: `Answer for ${stations}`, url },
    footer: guest
      ? `You get this mail because ${activity.coordinatorName} entered your address for ${stations}. The link is yours alone: pass it to nobody. If you do not know them, leave it: nothing happens.`
      : `You get this mail because you are in the crew of ${stations}.`,
  };
  return { subject: title, content };
}

function opening(
  kind: ActivityMailKind,
  activity: ActivityView,
  stations: string,
): { title: string; lead: string } {
  if (kind === 'invitation') {
    return {
      title: `${stations}: invited to ${activity.title}`,
      lead: `${activity.coordinatorName} plans contacts by the Moon and invites ${stations}.`,
    };
  }
  if (kind === 'reminder') {
    return {
      title: `${stations}: ${activity.title} waits for your answer`,
      lead: `${activity.coordinatorName} plans ${activity.title} and has no answer from ${stations} yet. Without one the station is left out of the plan.`,
    };
  }
  return {
    title: `${activity.title}: your link`,
    lead: `Here is a fresh link to your answer for ${stations}. Earlier ones still show it, but no longer change it.`,
  };
}

function paragraphsOf(text: string): string[] {
  return text
    .split(/\n\s*\n/)
    .map((paragraph) => paragraph.trim())
    .filter((paragraph) => paragraph !== '');
}

function listed(callSigns: readonly string[]): string {
  if (callSigns.length < 2) return callSigns[0] ?? '';
  return `${callSigns.slice(0, -1).join(', ')} and ${callSigns.at(-1)}`;
}
