import type { Decision } from '../../domain/sked/machine';
import type { SkedEventKind } from '../../domain/sked/types';
import { paths } from '../../paths';
import type { Viewer } from '../auth/viewer';
import type { Tx } from '../db/transaction';
import { enqueueMail } from '../mail/outbox';
import { renderMail } from '../mail/shell';
import { skedCalendar } from '../mail/templates/skedCalendar';
import { skedFacts, type SkedRecipient } from '../mail/templates/skedFacts';
import { skedMail, type SkedMailKind } from '../mail/templates/skedMail';
import type { Services } from '../services';
import type { LoadedSked } from './load';

interface Made {
  /** The sked as it was before the decision (after it, for the first offer). */
  loaded: LoadedSked;
  decision: Extract<Decision, { ok: true }>;
  by: string | null;
  actor: Viewer | null;
  words: string;
}

const MAILS: Partial<Record<SkedEventKind, SkedMailKind>> = {
  offered: 'offered',
  moved: 'moved',
  agreed: 'agreed',
  declined: 'declined',
  withdrawn: 'withdrawn',
  lapsed: 'lapsed',
  cancelled: 'cancelled',
};

/**
 * Puts the mails about a decision into the outbox, within the transaction that makes it. A message with a calendar
 * entry goes to every crew member of every party, the one who acted included, because it belongs into their
 * calendar too; any other goes to the crews of the other parties.
 */
export async function notifyDecision(tx: Tx, services: Services, made: Made): Promise<void> {
  const { loaded, decision, by, actor, words } = made;
  const kind = MAILS[decision.happenings.at(-1)!.kind];
  if (!kind) return;
  const { calendar, sked } = decision;
  const facts = skedFacts(
    loaded.row,
    loaded.stations,
    sked,
    services.config.publicUrl + paths.sked(loaded.row.id),
  );
  const callSignOf = (id: string) => loaded.stations.find((station) => station.id === id)!.callSign;
  const acted = by && actor ? { callSign: callSignOf(by), personName: actor.name } : null;
  for (const recipient of await crewsOf(tx, loaded)) {
    const own =
      recipient.personId === actor?.id || (by !== null && recipient.stationIds.includes(by));
    if (own && !calendar) continue;
    const { subject, content } = skedMail(
      {
        kind,
        facts,
        by: acted && { ...acted, you: recipient.personId === actor?.id },
        words,
        before: loaded.sked,
        gaveUpAgreed: kind === 'moved' && calendar !== null,
        yourOffer: recipient.stationIds.includes(loaded.sked.offeredBy),
      },
      recipient,
      recipient.stationIds.map(callSignOf),
    );
    await enqueueMail(tx, services, {
      to: recipient.email,
      subject,
      ...renderMail(content),
      ...(calendar
        ? {
            calendar: {
              method: calendar.method,
              body: skedCalendar(
                facts,
                recipient,
                calendar,
                services.config.smtp.from,
                services.now(),
              ),
            },
          }
        : {}),
    });
  }
}

/** Everybody in the crews of the parties who can be written to; each person once. */
async function crewsOf(tx: Tx, { stations }: LoadedSked): Promise<SkedRecipient[]> {
  const rows = await tx
    .selectFrom('station_crew')
    .innerJoin('person', 'person.id', 'station_crew.person_id')
    .select([
      'person.id',
      'person.email',
      'person.name',
      'person.time_zone',
      'station_crew.station_id',
    ])
    .where(
      'station_crew.station_id',
      'in',
      stations.map((station) => station.id),
    )
    .where('person.confirmed_at', 'is not', null)
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
        stationIds: [row.station_id],
      });
    }
  }
  return [...people.values()];
}
