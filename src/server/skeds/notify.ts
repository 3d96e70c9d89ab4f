import type { Decision, Sked } from '../../domain/sked/machine';
import { stillIn, type CalendarDue } from '../../domain/sked/standing';
import type { SkedEventKind } from '../../domain/sked/types';
import { paths } from '../../paths';
import type { Viewer } from '../auth/viewer';
import type { Db } from '../db/connection';
import type { Tx } from '../db/transaction';
import type { PersonalEntry } from '../mail/templates/skedCalendar';
import { skedFacts, type SkedRecipient } from '../mail/templates/skedFacts';
import { skedMail, type SkedMailKind } from '../mail/templates/skedMail';
import type { Services } from '../services';
import type { LoadedSked } from './load';
import { guestReached } from './recipients';
import { sendSkedMail } from './sendSkedMail';

interface Made {
  /** The sked as it was before the decision (after it, for the first offer). */
  loaded: LoadedSked;
  decision: Extract<Decision, { ok: true }>;
  by: string | null;
  actor: Viewer | null;
  words: string;
}

/**
 * Puts the mails about a decision into the outbox, within the transaction that makes it. Each carries a calendar entry,
 * so it goes to every crew member of every party, the one who acted included. An acceptance that others have to follow
 * changes the entries of its own crew only, and only they are written to.
 */
export async function notifyDecision(tx: Tx, services: Services, made: Made): Promise<void> {
  const { loaded, decision, by, actor, words } = made;
  const { calendar, sked } = decision;
  const kind = mailKind(decision);
  if (!kind || !calendar) return;
  const url = skedUrl(services, loaded);
  const stillIds = stillIn(sked.parties).map((party) => party.stationId);
  const stations = loaded.stations.filter(({ id }) => stillIds.includes(id));
  const facts = skedFacts(loaded.row, stations, sked, url);
  const callSignOf = (id: string) => loaded.stations.find((station) => station.id === id)!.callSign;
  const acted = by && actor ? { callSign: callSignOf(by), personName: actor.name } : null;
  const told = kind === 'accepted' && by ? [by] : loaded.stations.map(({ id }) => id);
  for (const recipient of await crewsOf(tx, told)) {
    const entry = personalEntry(sked, calendar, recipient.stationIds, services.now());
    const { subject, content } = skedMail(
      {
        kind,
        facts,
        by: acted && { ...acted, you: recipient.personId === actor?.id },
        words,
        before: loaded.sked,
        gaveUpAgreed: kind === 'moved' && loaded.sked.state === 'agreed',
        yourOffer: recipient.stationIds.includes(loaded.sked.offeredBy),
        asked: entry.asked,
        out: !recipient.stationIds.some((id) => stillIds.includes(id)),
        state: sked.state,
        waiting: waitingCallSigns(sked),
      },
      recipient,
      recipient.stationIds.map(callSignOf),
    );
    await sendSkedMail(tx, services, {
      sked: loaded.row,
      facts,
      recipient,
      subject,
      content,
      entry,
    });
  }
}

const MAILS: Record<SkedEventKind, SkedMailKind | null> = {
  offered: 'offered',
  moved: 'moved',
  accepted: 'accepted',
  agreed: 'agreed',
  declined: 'declined',
  droppedOut: 'droppedOut',
  withdrawn: 'withdrawn',
  lapsed: 'lapsed',
  cancelled: 'cancelled',
  reported: null,
};

/** The last thing that happened, except that somebody who left is told even when agreement follows from it. */
function mailKind({ happenings }: Made['decision']): SkedMailKind | null {
  const kinds = happenings.map((happening) => happening.kind);
  return MAILS[kinds.includes('droppedOut') ? 'droppedOut' : kinds.at(-1)!];
}

function skedUrl({ config }: Services, { row }: LoadedSked): string {
  return config.publicUrl + paths.sked(row.id);
}

function waitingCallSigns(sked: Sked): string[] {
  return stillIn(sked.parties)
    .filter((party) => party.answer === 'waiting')
    .map((party) => party.callSign);
}

/** What the calendar of somebody in the crews of these stations shows: nothing where all of them have dropped out. */
export function personalEntry(
  sked: Pick<Sked, 'state' | 'parties'>,
  calendar: CalendarDue,
  stationIds: readonly string[],
  stampMs: number,
): PersonalEntry {
  const own = stillIn(sked.parties).filter((party) => stationIds.includes(party.stationId));
  return {
    ...calendar,
    status: own.length > 0 ? calendar.status : 'CANCELLED',
    asked: sked.state === 'offered' && own.some((party) => party.answer === 'waiting'),
    stampMs,
  };
}

/**
 * Everybody in the crews of the stations who can be written to, each person once: people with a confirmed account, and
 * those who keep a guest station and have not asked for no more mail.
 */
export async function crewsOf(
  db: Db | Tx,
  stationIds: readonly string[],
): Promise<SkedRecipient[]> {
  const rows = await db
    .selectFrom('station_crew')
    .innerJoin('person', 'person.id', 'station_crew.person_id')
    .innerJoin('station', 'station.id', 'station_crew.station_id')
    .select([
      'person.id',
      'person.email',
      'person.name',
      'person.time_zone',
      'person.confirmed_at',
      'station_crew.station_id',
    ])
    .where('station_crew.station_id', 'in', [...stationIds])
    .where((or) => or.or([or('person.confirmed_at', 'is not', null), guestReached(or)]))
    .where('person.locked_at', 'is', null)
    .orderBy('person.email')
    .execute();
  const people = new Map<string, SkedRecipient>();
  for (const row of rows) {
    const known = people.get(row.id);
    if (known) known.stationIds.push(row.station_id);
    else {
      people.set(row.id, {
        personId: row.id,
        email: row.email,
        name: row.name,
        timeZone: row.time_zone,
        guest: row.confirmed_at === null,
        stationIds: [row.station_id],
      });
    }
  }
  return [...people.values()];
}
