/** One all-pairs search in a process that has done nothing before; started by allPairs.ts, prints milliseconds. */
import { allPairsOnce } from './allPairsOnce';
import { manyStations } from './manyStations';
import { timed } from './results';

const stations = manyStations(500);
console.log(timed(() => allPairsOnce(stations, 0)));
