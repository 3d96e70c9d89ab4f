import { stillIn } from '../../domain/sked/standing';
import { hasLapsed } from '../../domain/sked/machine';
import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';
import { inTransaction, type Tx } from '../db/transaction';
import { AppError } from '../errors';
import type { Services } from '../services';
import { acceptSked } from '../skeds/acceptSked';
import { cancelSked } from '../skeds/cancelSked';
import { declineSked } from '../skeds/declineSked';
import { dropOutSked } from '../skeds/dropOutSked';
import { eventSentence, eventsOf } from '../skeds/events';
import type { SkedAnswer } from '../skeds/schemas';
import { claimMail, type InboundOutcome } from './claim';
import { alternativesOf, mailBack } from './mailBack';
import type { CalendarAnswer } from './readAnswer';
import type { Answerer } from './whoAnswers';

const LONGEST_WORDS = 500;

/**
 * Counts what a calendar program answers as the person's answer: yes accepts, no declines an offer, leaves an agreed sked
 * of three or more and cancels one of two. An answer to an offer that has been replaced changes nothing, nor one that
 * cannot be; the person is told why by mail. Throws `Duplicate`.
 */
export async function answerByCalendar(
  services: Services,
  about: Answerer,
  answer: CalendarAnswer,
  messageId: string,
): Promise<InboundOutcome> {
  const { person } = about;
  const own = answer.attendees.find(({ email }) => email === person.email.toLowerCase());
  const refuse = (outcome: InboundOutcome, sentences: string[], error?: AppError) =>
    inTransaction(services.db, async (tx) => {
      await claimMail(tx, services, messageId, outcome);
      const alternatives = error ? alternativesOf(error) : [];
      await mailBack(tx, services, about, { sentences, alternatives, corrects: true });
      return outcome;
    });
  if (!own) {
    return refuse('refused', [
      `The answer was given for another address than ${person.email}. Answer on the page of the sked.`,
    ]);
  }
  if (answer.method === 'COUNTER') {
    return refuse('refused', ['Another time is offered on the page of the sked.']);
  }
  const wish = wishOf(about, own.partstat, services.now());
  if (wish === 'nothing') return noted(services, messageId, own.partstat);
  const since = await happenedSince(services.db, about, answer.sequence, own.partstat);
  if (since.length > 0) return refuse('stale', ['The sked has changed since that mail.', ...since]);
  try {
    await wish(services, viewerOf(about), about.loaded.row.id, {
      version: about.loaded.sked.version,
      words: [...answer.comment].slice(0, LONGEST_WORDS).join(''),
      ...(about.stationIds[0] === undefined ? {} : { as: choose(about, own.partstat) }),
      first: (tx: Tx) => claimMail(tx, services, messageId, 'answered'),
    });
  } catch (error) {
    if (!(error instanceof AppError)) throw error;
    return refuse('refused', [error.message], error);
  }
  return 'answered';
}

type Wish = (
  services: Services,
  viewer: Viewer,
  skedId: string,
  input: SkedAnswer,
) => Promise<unknown>;

/** What an answer asks for as the sked now stands; nothing where it says what is so already, or says neither yes nor no. */
function wishOf(
  { loaded, stationIds }: Answerer,
  partstat: string,
  nowMs: number,
): Wish | 'nothing' {
  const { sked } = loaded;
  const own = stillIn(sked.parties).filter((party) => stationIds.includes(party.stationId));
  const holds = sked.state === 'agreed' || sked.state === 'reported';
  const open = sked.state === 'offered' && !hasLapsed(sked, nowMs);
  if (partstat === 'ACCEPTED') {
    const said = own.length > 0 && own.every((party) => party.answer === 'accepted');
    return said && (holds || open) ? 'nothing' : acceptSked;
  }
  if (partstat !== 'DECLINED' || own.length === 0) return 'nothing';
  if (open) return declineSked;
  if (sked.state === 'agreed') return stillIn(sked.parties).length > 2 ? dropOutSked : cancelSked;
  return sked.state === 'reported' ? cancelSked : 'nothing';
}

/** On behalf of which of the person's stations: one that still has to say it. */
function choose({ loaded, stationIds }: Answerer, partstat: string): string {
  const waiting = stillIn(loaded.sked.parties).find(
    (party) => stationIds.includes(party.stationId) && party.answer === 'waiting',
  );
  return (partstat === 'ACCEPTED' ? waiting?.stationId : undefined) ?? stationIds[0]!;
}

function viewerOf({ person }: Answerer): Viewer {
  const { personId: id, email, name, timeZone } = person;
  return { id, email, name, timeZone, role: 'operator' };
}

function noted(services: Services, messageId: string, partstat: string): Promise<InboundOutcome> {
  const outcome = ['ACCEPTED', 'DECLINED'].includes(partstat) ? 'unchanged' : 'noted';
  return inTransaction(services.db, async (tx) => {
    await claimMail(tx, services, messageId, outcome);
    return outcome;
  });
}

/**
 * What happened after the message that is answered, in words, when it makes the answer one to something else: a new
 * offer, and for a "no" also that the slot has been agreed since.
 */
async function happenedSince(
  db: Db,
  { loaded }: Answerer,
  sequence: number,
  partstat: string,
): Promise<string[]> {
  const turns = ['offered', 'moved', ...(partstat === 'DECLINED' ? ['agreed'] : [])];
  const since = (await eventsOf(db, loaded.row.id)).filter((event) => event.sequence > sequence);
  return since.some((event) => turns.includes(event.kind)) ? since.map(eventSentence) : [];
}
