import { z } from 'zod';
import { figure, record } from '../station/fields';
import type { PlanPriority, PlanWeights } from './plan/types';

/** What the plan looks at when it cannot place every wish. */
export const FAVOURS = ['both', 'chance', 'priority'] as const;
export type Favour = (typeof FAVOURS)[number];

export const FAVOUR_WORDS: Record<Favour, string> = {
  both: 'likely contacts and high priorities alike',
  chance: 'likely contacts, whatever their priority',
  priority: 'high priorities first, likely contacts among equals',
};

/** How much a station's first contact counts beyond its own worth. */
export const SPREADS = ['firmly', 'somewhat', 'no'] as const;
export type Spread = (typeof SPREADS)[number];

export const SPREAD_WORDS: Record<Spread, string> = {
  firmly: 'yes, before anything else',
  somewhat: 'yes, where it costs little',
  no: 'no, only the sum counts',
};

export const LEAST_CHANCES = [0.02, 0.05, 0.1, 0.25, 0.5] as const;

export function leastChanceWords(chance: number): string {
  return `at least 1 in ${Math.round(1 / chance)}`;
}

/** What counts in the plan of one activity, as it is stored. */
export interface ActivityWeights {
  favour: Favour;
  spread: Spread;
  /** Starts at which a contact is less likely are not offered to the plan. */
  leastChance: number;
  /** The Moon stands at least so high for both; 0: only the stations' own limits. */
  leastElevationDeg: number;
}

export const DEFAULT_WEIGHTS: ActivityWeights = {
  favour: 'both',
  spread: 'somewhat',
  leastChance: 0.05,
  leastElevationDeg: 0,
};

export const weightsSchema = record({
  favour: z.enum(FAVOURS, { error: 'Choose what the plan should favour.' }),
  spread: z.enum(SPREADS, { error: 'Choose whether everybody should get a contact.' }),
  leastChance: figure('The least chance', 0, 0.9),
  leastElevationDeg: figure('The least elevation', 0, 60, '°'),
});

/** So much that the least likely contact counts more than a sure one of the next lower priority. */
const PRIORITY_FIRST = 0.7;

const FIRST_CONTACT: Record<Spread, number> = { firmly: 10, somewhat: 0.3, no: 0 };

/** The weights of the plan; what stood in an earlier plan stays where it can. */
export function planWeights({ favour, spread }: ActivityWeights): PlanWeights {
  return {
    firstContact: FIRST_CONTACT[spread],
    balance: spread === 'no' ? 0 : 0.01,
    keep: 1,
    ...(favour === 'priority' ? { sure: PRIORITY_FIRST } : {}),
  };
}

/** The priority that a wish has in the plan. */
export function planPriority(priority: PlanPriority, { favour }: ActivityWeights): PlanPriority {
  return favour === 'chance' ? 2 : priority;
}
