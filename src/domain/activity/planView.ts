import type { SkedResult } from '../sked/types';
import type { BandId } from '../station/bands';
import type { Interval } from '../time/interval';

/** A published plan as everybody may read it. */
export interface PlanView {
  number: number;
  publishedMs: number;
  /** Whether it is the one in force. */
  current: boolean;
  note: string;
  stations: PlanViewStation[];
  /** In order of time. */
  slots: PlanViewSlot[];
  /** Every revision that was ever published, newest first. */
  revisions: { number: number; publishedMs: number; current: boolean }[];
}

export interface PlanViewStation {
  id: string;
  /** Number on the roster. */
  place: number;
  callSign: string;
  name: string;
  /** As far as the station shows it; the position is the middle of that field. */
  locator: string;
  latitudeDeg: number;
  longitudeDeg: number;
  timeZone: string;
}

export interface PlanViewSlot extends Interval {
  skedId: string;
  /** Indexes into the stations; the first comes first on the roster. */
  first: number;
  second: number;
  band: BandId;
  frequencyMhz: number;
  mode: string;
  marginDb: number | null;
  state: 'agreed' | 'givenBack' | 'over';
  /** What each of the two has reported. */
  results: [SkedResult | null, SkedResult | null];
}

/** Whether both say that it was completed, one does alone, they disagree, or nobody has said anything yet. */
export type SlotOutcome = 'worked' | 'workedBySome' | 'disagreed' | 'notWorked' | 'unknown';

export function outcomeOf({ results }: Pick<PlanViewSlot, 'results'>): SlotOutcome {
  const [first, second] = results;
  if (first === null && second === null) return 'unknown';
  if (first === null || second === null) {
    return (first ?? second) === 'completed' ? 'workedBySome' : 'notWorked';
  }
  if (first === second) return first === 'completed' ? 'worked' : 'notWorked';
  return first === 'completed' || second === 'completed' ? 'disagreed' : 'notWorked';
}

export const OUTCOME_WORDS: Record<SlotOutcome, string> = {
  worked: 'worked',
  workedBySome: 'worked, one side has reported',
  disagreed: 'the two sides disagree',
  notWorked: 'not completed',
  unknown: 'not reported yet',
};

export interface PlanTotals {
  slots: number;
  givenBack: number;
  over: number;
  worked: number;
  disagreed: number;
  notReported: number;
  /** Stations with at least one completed contact. */
  stationsWorked: number;
}

export function totalsOf({ slots }: Pick<PlanView, 'slots'>): PlanTotals {
  const held = slots.filter(({ state }) => state !== 'givenBack');
  const over = held.filter(({ state }) => state === 'over');
  const having = (...outcomes: SlotOutcome[]) =>
    over.filter((slot) => outcomes.includes(outcomeOf(slot)));
  const worked = having('worked', 'workedBySome');
  return {
    slots: held.length,
    givenBack: slots.length - held.length,
    over: over.length,
    worked: worked.length,
    disagreed: having('disagreed').length,
    notReported: having('unknown').length,
    stationsWorked: new Set(worked.flatMap(({ first, second }) => [first, second])).size,
  };
}
