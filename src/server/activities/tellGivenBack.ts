import { bandById } from '../../domain/station/bands';
import { formatLocalRange, formatUtcRange } from '../../domain/time/format';
import { paths } from '../../paths';
import type { Viewer } from '../auth/viewer';
import type { Tx } from '../db/transaction';
import { enqueueMail } from '../mail/outbox';
import { renderMail } from '../mail/shell';
import type { Services } from '../services';

/**
 * Tells the coordinator that a station gave a slot of the plan back, within the transaction that cancels its sked.
 * Does nothing for a sked that belongs to no activity, nor when the coordinator did it.
 */
export async function tellGivenBack(
  tx: Tx,
  services: Services,
  given: { skedId: string; by: string; words: string; viewer: Pick<Viewer, 'id' | 'name'> },
): Promise<void> {
  const row = await tx
    .selectFrom('sked')
    .innerJoin('activity', 'activity.id', 'sked.activity_id')
    .innerJoin('person', 'person.id', 'activity.coordinator_id')
    .select([
      'activity.id',
      'activity.slug',
      'activity.title',
      'person.id as coordinator_id',
      'person.email',
      'person.time_zone',
      'sked.band',
      'sked.start_at',
      'sked.end_at',
    ])
    .where('sked.id', '=', given.skedId)
    .where('person.locked_at', 'is', null)
    .executeTakeFirst();
  if (!row || row.coordinator_id === given.viewer.id) return;
  const parties = await tx
    .selectFrom('sked_party')
    .innerJoin('station', 'station.id', 'sked_party.station_id')
    .select(['station.id', 'station.call_sign'])
    .where('sked_id', '=', given.skedId)
    .orderBy('place')
    .execute();
  const giver = parties.find(({ id }) => id === given.by)?.call_sign ?? '';
  const partner = parties.find(({ id }) => id !== given.by)?.call_sign ?? '';
  const slot = { startMs: row.start_at, endMs: row.end_at };
  await enqueueMail(tx, services, {
    to: row.email,
    subject: `${giver} gave a slot back: ${formatUtcRange(slot)}, ${row.title}`,
    ...renderMail({
      title: `${giver} gave a slot back`,
      paragraphs: [
        `${given.viewer.name}, ${giver}, cannot keep the slot with ${partner} in “${row.title}”. ${partner} has been told, and the calendar entries are withdrawn.`,
        'The rest of the plan stands. You can begin a new revision and find both another contact.',
      ],
      facts: [
        ['UTC', formatUtcRange(slot, { withYear: true })],
        ...(row.time_zone === 'UTC'
          ? []
          : [['Your time', formatLocalRange(slot, row.time_zone)] as [string, string]]),
        ['Band', bandById(row.band).label],
        ...(given.words ? [[`${given.viewer.name} writes`, given.words] as [string, string]] : []),
      ],
      button: {
        label: 'Open the timetable',
        url: services.config.publicUrl + paths.activityTimetable(row.slug),
      },
      footer: `You get this mail because you coordinate “${row.title}”.`,
    }),
    topic: 'sked',
    personId: row.coordinator_id,
    skedId: given.skedId,
    activityId: row.id,
  });
}
