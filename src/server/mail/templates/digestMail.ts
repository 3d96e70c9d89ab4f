import { partnersOf, type SkedSummary } from '../../../domain/sked/view';
import { bandById } from '../../../domain/station/bands';
import { formatDuration, formatLocalRange, formatUtcRange } from '../../../domain/time/format';
import type { MailContent } from '../shell';

/** What waits for a person, gathered into one mail. */
export function digestMail(
  waiting: { offers: readonly SkedSummary[]; reports: readonly SkedSummary[] },
  reader: { name: string; timeZone: string },
  urls: { home: string; preferences: string },
  nowMs: number,
): { subject: string; content: MailContent } {
  const { offers, reports } = waiting;
  const parts = [
    ...(offers.length > 0 ? [`${count(offers.length, 'offer')} to answer`] : []),
    ...(reports.length > 0 ? [`${count(reports.length, 'sked')} to report`] : []),
  ].join(', ');
  const line = (sked: SkedSummary) =>
    [
      partnersOf(sked.parties),
      bandById(sked.band).label,
      formatUtcRange(sked),
      ...(reader.timeZone === 'UTC' ? [] : [formatLocalRange(sked, reader.timeZone)]),
    ].join(', ');
  return {
    subject: `Waits for you: ${parts}`,
    content: {
      title: `Waits for you: ${parts}`,
      paragraphs: [
        `${reader.name}, ${offers.length + reports.length === 1 ? 'this waits' : 'these wait'} for an answer or a result of yours.`,
      ],
      facts: [
        ...offers.map((sked): [string, string] => [
          'Answer',
          `${line(sked)}. Lapses in ${formatDuration(sked.startMs - nowMs)}.`,
        ]),
        ...reports.map((sked): [string, string] => [
          'Report',
          `${line(sked)}. Ended ${formatDuration(nowMs - sked.endMs)} ago.`,
        ]),
      ],
      button: { label: 'Open what waits', url: urls.home },
      links: [{ label: 'How often this comes, and when', url: urls.preferences }],
      footer: 'You get this mail because something waits for you; with nothing waiting none comes.',
    },
  };
}

function count(many: number, what: string): string {
  return `${many} ${what}${many === 1 ? '' : 's'}`;
}
