import type { LinkSetup } from '../../link/setup';
import type { Site, SkyLimits } from '../../sky/limits';
import type { Interval } from '../../time/interval';
import type { PlanPriority } from './types';

/** An activity as people enter it: the data from which options are built and against which a plan is checked. */
export interface PlanInput extends Interval {
  rules: PlanRules;
  bands: PlanBand[];
  stations: PlanInputStation[];
  wishes: PlanInputWish[];
}

export interface PlanRules {
  gridMinutes: number;
  slotMinutes: number;
  bandChangeMinutes: number;
  /** Most contacts of a station without a pause of at least `leastPauseMinutes`; 0: as many as you like. */
  mostInARow: number;
  leastPauseMinutes: number;
  /** The Moon stands at least so high for both, airless; 0: only the stations' own limits count. */
  leastElevationDeg: number;
  /** Starts with a lower chance of the contact are no options; 0 … 1. */
  leastChance: number;
}

export interface PlanBand {
  id: string;
  label: string;
  frequencyMhz: number;
  mode: string;
}

export interface PlanInputStation {
  id: string;
  callSign: string;
  site: Site;
  sky: SkyLimits;
  /** When its people are there during the activity, sorted and disjoint; absent: always. */
  usable?: Interval[] | undefined;
  /** Equipment by band id; a band without is one that the station does not work. */
  setups: Record<string, LinkSetup>;
  /** Contacts at most. */
  most: number;
  /** Ids of stations that it must not be put together with. */
  never: string[];
}

export interface PlanInputWish {
  id: string;
  /** Ids of the two stations. */
  a: string;
  b: string;
  priority: PlanPriority;
  /** Ids of the bands on which it may be; one contact in all. */
  bands: string[];
}
