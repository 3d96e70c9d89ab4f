import { allPairs500x72h } from './allPairs';
import { drag60days } from './drag';
import { growth } from './growth';
import { linkPair30d } from './link';
import { plan100x1000, plan24x276, plan40x200, replan40x200 } from './plan';
import { mailFaults200 } from './mailFaults';
import { planLatency } from './planLatency';
import { race10000 } from './race';
import { mergeResults, printResults, type Bench } from './results';
import { timetableDrag } from './timetableDrag';
import { windowsPair30d } from './windowsPair30d';

const BENCHES: readonly Bench[] = [
  windowsPair30d,
  allPairs500x72h,
  growth,
  linkPair30d,
  drag60days,
  plan40x200,
  plan24x276,
  plan100x1000,
  replan40x200,
  mailFaults200,
  race10000,
  planLatency,
  timetableDrag,
];

const filter = process.argv[2] ?? '';
const chosen = BENCHES.filter(({ name }) => `.${name}`.includes(`.${filter}`));
if (chosen.length === 0) {
  console.error(
    `No benchmark has a part that begins with “${filter}”. There are: ${BENCHES.map(({ name }) => name).join(', ')}.`,
  );
  process.exit(1);
}
for (const bench of chosen) {
  const results = await bench.run();
  printResults(results);
  mergeResults(results);
}
