import { formatLocal, formatUtc } from '../../../domain/time/format';
import { paths } from '../../../paths';
import type { PersonRow } from '../../db/tables';
import type { OutgoingMail } from '../outbox';
import { renderMail, type MailContent } from '../shell';

type Recipient = Pick<PersonRow, 'email' | 'name' | 'time_zone'>;

/** A link that works once, until an instant. */
interface Link {
  secret: string;
  expiresAtMs: number;
}

function mail(to: Recipient, subject: string, content: MailContent): OutgoingMail {
  return { to: to.email, subject, ...renderMail(content) };
}

function instant(atMs: number, { time_zone }: Recipient): string {
  const utc = formatUtc(atMs, { withYear: true });
  return time_zone === 'UTC' ? utc : `${utc}, ${formatLocal(atMs, time_zone)}`;
}

function worksUntil(link: Link, to: Recipient): [string, string][] {
  return [['The link works once, until', instant(link.expiresAtMs, to)]];
}

/**
 * To somebody who registered: confirm the address and choose a password. The name is left out, because
 * anybody can enter any name with somebody else's address.
 */
export function confirmAddressMail(publicUrl: string, to: Recipient, link: Link): OutgoingMail {
  return mail(to, 'Confirm your address for Echotide', {
    title: 'Confirm your address',
    paragraphs: [
      'You registered at Echotide with this address. Confirm it and choose a password, then describe your station.',
    ],
    facts: worksUntil(link, to),
    button: { label: 'Confirm your address', url: publicUrl + paths.confirmMail(link.secret) },
    footer:
      'You get this because somebody entered your address at Echotide. If that was not you, do nothing: without confirmation no account is opened.',
  });
}

/** To somebody whose address was entered on the register page although it has an account. */
export function alreadyRegisteredMail(publicUrl: string, to: Recipient): OutgoingMail {
  return mail(to, 'You already have an Echotide account', {
    title: 'You already have an account',
    paragraphs: [
      `${to.name}, somebody entered your address to register at Echotide. It has an account already, so nothing was changed.`,
      `If that was you, sign in. Without your password, choose a new one at ${publicUrl}${paths.forgotten}.`,
    ],
    button: { label: 'Sign in', url: publicUrl + paths.signIn },
    footer:
      'If that was not you, do nothing. Whoever it was did not learn that you are registered.',
  });
}

export function signInLinkMail(publicUrl: string, to: Recipient, link: Link): OutgoingMail {
  return mail(to, 'Your sign-in link for Echotide', {
    title: 'Sign in to Echotide',
    paragraphs: [`${to.name}, this link signs you in without a password.`],
    facts: worksUntil(link, to),
    button: { label: 'Sign in', url: publicUrl + paths.useSignInLink(link.secret) },
    footer:
      'You get this because somebody asked for a sign-in link with your address. If that was not you, do nothing, and pass the link to nobody.',
  });
}

export function resetPasswordMail(publicUrl: string, to: Recipient, link: Link): OutgoingMail {
  return mail(to, 'Choose a new Echotide password', {
    title: 'Choose a new password',
    paragraphs: [
      `${to.name}, somebody asked for a new password for your account. Your present one works until you choose another.`,
    ],
    facts: worksUntil(link, to),
    button: { label: 'Choose a new password', url: publicUrl + paths.resetPassword(link.secret) },
    footer: 'If that was not you, do nothing, and pass the link to nobody.',
  });
}

export function passwordChangedMail(
  publicUrl: string,
  to: Recipient,
  changedAtMs: number,
): OutgoingMail {
  return mail(to, 'Your Echotide password was changed', {
    title: 'Your password was changed',
    paragraphs: [
      `${to.name}, the password of your account was changed, and every other session was signed out.`,
      `If that was not you, choose a new one at once at ${publicUrl}${paths.forgotten}.`,
    ],
    facts: [['Changed', instant(changedAtMs, to)]],
    footer: 'You get this so that no change of your password goes unseen.',
  });
}
