import type { Site, SkyLimits } from '../sky/limits';
import type { Interval } from '../time/interval';

/** Why an hour is not usable, or what opens and closes a window. `usableHours`: its people sleep or are away. */
export type LimitReason =
  | 'horizon'
  | 'elevationLimit'
  | 'transmitElevation'
  | 'azimuthLimit'
  | 'blockedSector'
  | 'horizonProfile'
  | 'usableHours'
  | 'degradation'
  | 'sunSeparation'
  | 'margin'
  | 'tooShort'
  | 'searchLimit';

/** `callSign` is null where the reason is nobody's own (the Sun, the end of the search). */
export interface LimitCause {
  callSign: string | null;
  reason: LimitReason;
  /** Name of the blocked sector, where it has one. */
  name?: string | undefined;
}

export interface WindowStation {
  callSign: string;
  site: Site;
  sky: SkyLimits;
  /** Hours in which its people are awake and there, sorted and disjoint; absent: always. */
  usable?: Interval[] | undefined;
}

export interface WindowSearch extends Interval {
  stations: WindowStation[];
  frequencyMhz?: number | undefined;
  /** Default 1. */
  minimumMinutes?: number | undefined;
  maximumDegradationDb?: number | undefined;
  minimumSunSeparationDeg?: number | undefined;
  /** Compare elevations refracted instead of airless. Default false. */
  refraction?: boolean | undefined;
}

export interface WindowStationSummary {
  callSign: string;
  startAzimuthDeg: number;
  startElevationDeg: number;
  endAzimuthDeg: number;
  endElevationDeg: number;
  maximumElevationDeg: number;
}

export interface CommonWindow extends Interval {
  opens: LimitCause;
  closes: LimitCause;
  /** The moment of least degradation where a frequency is given, else of the greatest lower elevation. */
  best: { timeMs: number; degradationDb?: number | undefined };
  stations: WindowStationSummary[];
}

export interface LostHours extends LimitCause {
  hours: number;
}

export interface WindowResult {
  windows: CommonWindow[];
  lost: LostHours[];
}
