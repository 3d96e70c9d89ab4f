import { formatDay } from '../../domain/time/format';
import type { CrewRole } from '../../domain/station/views';
import { paths } from '../../paths';
import type { OutgoingMail } from '../mail/outbox';
import { renderMail } from '../mail/shell';

interface Invitation {
  publicUrl: string;
  to: string;
  inviterName: string;
  callSign: string;
  crewRole: CrewRole;
  secret: string;
  expiresMs: number;
}

/** The mail that invites somebody to a station's crew. */
export function crewInvitationMail(invitation: Invitation): OutgoingMail {
  const { callSign, inviterName, crewRole } = invitation;
  const title = `${inviterName} invites you to the crew of ${callSign}`;
  const duty =
    crewRole === 'keeper'
      ? 'As a keeper you can change the station and its crew, and answer for it.'
      : 'As an operator you can offer skeds and answer for the station.';
  const rendered = renderMail({
    title,
    paragraphs: [
      duty,
      'The page asks you before anything happens. You need an account; you can make one there.',
    ],
    facts: [
      ['Station', callSign],
      ['As', crewRole],
      ['Open until', `${formatDay(invitation.expiresMs, { withYear: true })} UTC`],
    ],
    button: {
      label: `Join the crew of ${callSign}`,
      url: `${invitation.publicUrl}${paths.joinCrew(invitation.secret)}`,
    },
    footer: `You get this mail because ${inviterName} entered your address at ${callSign}. If you do not know them, leave it: nothing happens.`,
  });
  return { to: invitation.to, subject: title, ...rendered };
}
