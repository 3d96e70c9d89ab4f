import { formatLocalRange, formatUtcRange } from '../../../domain/time/format';
import type { SkedMailFacts } from './skedFacts';

/** The slot in UTC, in the reader's zone and at every station. */
export function skedTimes(
  facts: Pick<SkedMailFacts, 'startMs' | 'endMs' | 'stations'>,
  readerZone: string,
): [string, string][] {
  return [
    ['UTC', formatUtcRange(facts, { withYear: true })],
    ...(readerZone === 'UTC'
      ? []
      : [['Your time', formatLocalRange(facts, readerZone)] as [string, string]]),
    ...facts.stations.map(
      ({ callSign, timeZone }) => [callSign, formatLocalRange(facts, timeZone)] as [string, string],
    ),
  ];
}
