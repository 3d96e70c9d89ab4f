import { describe, expect, it } from 'vitest';
import { changesOf, itineraryOf } from '~/domain/activity/itinerary';
import { diffOfStation, diffRevisions, type RevisionSlot } from '~/domain/activity/revision';
import { MINUTE_MS } from '~/domain/time/interval';

const CALL_SIGNS = new Map([
  ['a', 'QA1LUN'],
  ['b', 'QB7TID'],
  ['c', 'QC2ALP'],
]);
// Sat 13 Feb 2027
const at = (hour: number, minute = 0) => Date.UTC(2027, 1, 13, hour, minute);

function slot(stationA: string, stationB: string, startMs: number): RevisionSlot {
  return {
    stationA,
    stationB,
    band: '1296',
    startMs,
    endMs: startMs + 30 * MINUTE_MS,
    pinned: false,
    priority: 2,
    chance: 0.5,
    marginDb: 3,
  };
}

describe('an itinerary', () => {
  it('names the partner from either side, UTC first and the reader’s clock beside', () => {
    const slots = [slot('b', 'c', at(22)), slot('a', 'b', at(21)), slot('a', 'c', at(23))];
    expect(itineraryOf(slots, 'b', CALL_SIGNS, 'America/New_York')).toEqual([
      {
        partner: 'QA1LUN',
        utc: 'Sat 13 Feb 21:00–21:30 UTC',
        local: expect.stringMatching(/^Sat 13 Feb 16:00–16:30/) as unknown,
        band: '1296 MHz',
      },
      expect.objectContaining({ partner: 'QC2ALP' }),
    ]);
  });

  it('has no second clock where the reader lives by UTC', () => {
    expect(itineraryOf([slot('a', 'b', at(21))], 'a', CALL_SIGNS, 'UTC')[0]?.local).toBeNull();
  });
});

describe('what a revision changes', () => {
  it('is told in order of time, with both times of what moved', () => {
    const before = [slot('a', 'b', at(17, 30)), slot('a', 'c', at(19))];
    const after = [slot('a', 'b', at(21)), slot('b', 'c', at(18))];
    const diff = diffOfStation(diffRevisions(before, after), 'a');
    expect(changesOf(diff, 'a', CALL_SIGNS)).toEqual([
      'Taken out: QC2ALP on 1296 MHz, Sat 13 Feb 19:00–19:30 UTC.',
      'Moved: QB7TID on 1296 MHz, from Sat 13 Feb 17:30–18:00 UTC to Sat 13 Feb 21:00–21:30 UTC.',
    ]);
  });
});
