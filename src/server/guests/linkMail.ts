import { formatUtcRange } from '../../domain/time/format';
import { paths } from '../../paths';
import type { Tx } from '../db/transaction';
import { skedFacts } from '../mail/templates/skedFacts';
import type { Services } from '../services';
import { loadSked } from '../skeds/load';
import { crewsOf } from '../skeds/notify';
import { sendSkedMail } from '../skeds/sendSkedMail';

/** What a mail says whose point is the link in it. */
export interface LinkMailWords {
  title: string;
  paragraph: string;
}

/** Mails a fresh link to the person, unless nothing may be sent there. */
export async function sendLinkMail(
  tx: Tx,
  services: Services,
  { skedId, personId }: { skedId: string; personId: string },
  { title, paragraph }: LinkMailWords,
): Promise<void> {
  const loaded = await loadSked(tx, skedId);
  if (!loaded) return;
  const { row, stations, sked } = loaded;
  const ids = sked.parties.map((party) => party.stationId);
  const recipient = (await crewsOf(tx, ids)).find((one) => one.personId === personId);
  if (!recipient) return;
  const facts = skedFacts(row, stations, sked, services.config.publicUrl + paths.sked(row.id));
  await sendSkedMail(tx, services, {
    sked: row,
    facts,
    recipient,
    subject: `${title}, ${formatUtcRange(facts)}, ${facts.bandLabel}`,
    content: {
      title,
      paragraphs: [paragraph],
      facts: [
        ['UTC', formatUtcRange(facts, { withYear: true })],
        ['Stations', facts.stations.map(({ callSign }) => callSign).join(', ')],
        ['Band and mode', `${facts.frequency}, ${facts.modeLabel}`],
      ],
      button: { label: 'Open the sked', url: facts.url },
      footer: 'You get this mail because of what was done behind an earlier link.',
    },
  });
}
