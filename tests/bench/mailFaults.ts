import { runFaults } from '../integration/mail/faultRun';
import type { Bench, BenchResult } from './results';

const ROUNDS = 200;

async function run(): Promise<BenchResult[]> {
  const report = await runFaults(ROUNDS, 20_261_201);
  const { mails, sent, setAside, lost, strange, duplicates, unexplained } = report;
  console.table(report.conversations);
  for (const words of [...lost, ...strange]) console.log(words);
  for (const acceptance of unexplained) console.log(acceptance);
  console.log(
    `${report.seconds.toFixed(0)} s, integrity of the database: ${report.integrity}, ` +
      `copies that need not have been sent: ${unexplained.length}, ` +
      `mails that were never committed: ${strange.length}`,
  );
  return [
    {
      name: `mail.faults${ROUNDS}.lost`,
      value: lost.length + strange.length,
      unit: 'mails',
      note: `of ${mails}: ${sent} sent, ${setAside} set aside after a 5xx; ${report.kills} kills of the worker`,
    },
    {
      name: `mail.faults${ROUNDS}.duplicates`,
      value: duplicates,
      unit: 'copies',
      note: `same Message-ID, taken without the worker hearing it; ${unexplained.length} for any other reason`,
    },
  ];
}

export const mailFaults200: Bench = { name: `mail.faults${ROUNDS}`, run };
