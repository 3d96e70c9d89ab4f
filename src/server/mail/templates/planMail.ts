import type { ItineraryLine } from '../../../domain/activity/itinerary';
import { listOf } from '../../../domain/sked/view';
import type { MailContent } from '../shell';

export interface PlanNews {
  title: string;
  /** Whether it is the first plan of the activity that is published. */
  first: boolean;
  number: number;
  coordinatorName: string;
  /** What the coordinator adds for everybody. */
  note: string;
  /** By station of the reader for which something changed. */
  stations: { callSign: string; itinerary: ItineraryLine[]; changes: string[] }[];
  url: string;
}

/** The itinerary of a crew after a plan or a new revision of it was published, with what changed for them. */
export function planMail(news: PlanNews): { subject: string; content: MailContent } {
  const callSigns = listOf(news.stations.map(({ callSign }) => callSign));
  const several = news.stations.length > 1;
  const changes = news.stations.flatMap(({ callSign, changes: own }) =>
    own.map((change) => (several ? `${callSign}: ${change}` : change)),
  );
  const count = news.stations.reduce((sum, { itinerary }) => sum + itinerary.length, 0);
  const slots = count === 1 ? '1 slot' : `${count} slots`;
  return {
    subject: news.first
      ? `${news.title}: ${slots} for ${callSigns}`
      : `${news.title}, revision ${news.number}: changed for ${callSigns}`,
    content: {
      title: news.first ? `Your itinerary for “${news.title}”` : `Changed: “${news.title}”`,
      paragraphs: [
        news.first
          ? `${news.coordinatorName} has published the plan. It has ${slots} for ${callSigns}. They are agreed skeds: nothing is left to answer, and nobody can book you twice.`
          : `${news.coordinatorName} has published revision ${news.number} of the plan. This is different for ${callSigns}:`,
        ...(news.first ? [] : changes),
        ...(news.note ? [`${news.coordinatorName} writes: ${news.note}`] : []),
        count === 0
          ? `There is no slot left for ${callSigns}.`
          : news.first
            ? 'Your slots, with the calendar entries in this mail:'
            : 'Your slots as they stand now. The changed calendar entries are in this mail.',
      ],
      facts: news.stations.flatMap(({ callSign, itinerary }) =>
        itinerary.map(
          ({ partner, utc, local, band }) =>
            [
              utc,
              [`${several ? `${callSign} – ` : ''}${partner}`, band, local]
                .filter(Boolean)
                .join(', '),
            ] as [string, string],
        ),
      ),
      button: { label: 'Open your itinerary', url: news.url },
      footer: `You get this mail because you belong to the crew of ${callSigns}, which is on the roster of “${news.title}”. If you cannot keep a slot, give it back on its page.`,
    },
  };
}
