import type { LocatorCell } from '../locator/locator';
import type { SkyLimits } from '../sky/limits';
import type { BandId } from './bands';
import type { StationHours } from './hoursSchema';
import type { PublicLocatorLength } from './schema';
import type { BandSetup } from './setup';

export type CrewRole = 'keeper' | 'operator';

export interface BandEquipment {
  band: BandId;
  setup: BandSetup;
}

/** A station as its crew sees it: everything, exactly. */
export interface CrewStation {
  id: string;
  version: number;
  callSign: string;
  name: string;
  latitudeDeg: number;
  longitudeDeg: number;
  heightM: number;
  locator: string;
  publicLocatorLength: PublicLocatorLength;
  timeZone: string;
  sky: SkyLimits;
  hours: StationHours;
  equipment: BandEquipment[];
  listed: boolean;
  note: string;
  /** Of the viewer. */
  crewRole: CrewRole;
}

/**
 * A station as everybody sees it: the locator cut to what its keeper shows and the cell of that locator
 * instead of coordinates, no height, and the sky in coarse steps (`coarseSky`).
 */
export interface PublicStation {
  id: string;
  callSign: string;
  name: string;
  locator: string;
  cell: LocatorCell;
  timeZone: string;
  sky: SkyLimits;
  equipment: BandEquipment[];
  note: string;
  hoursKnown: boolean;
}

/** What a station still lacks. */
export type MissingPart = 'sky' | 'equipment' | 'hours';

export interface MyStationCard {
  id: string;
  callSign: string;
  name: string;
  locator: string;
  timeZone: string;
  bands: BandId[];
  crewRole: CrewRole;
  crewCount: number;
  listed: boolean;
  missing: MissingPart[];
}

export interface PublicStationCard {
  id: string;
  callSign: string;
  name: string;
  locator: string;
  timeZone: string;
  bands: BandId[];
}

export interface PublicStationPage {
  stations: PublicStationCard[];
  /** Pass it as `after` for the next page; null on the last. */
  next: string | null;
}

export interface CrewMember {
  personId: string;
  name: string;
  /** Shown to keepers only. */
  email: string | null;
  crewRole: CrewRole;
  isViewer: boolean;
}

export interface OpenInvitation {
  id: string;
  email: string;
  crewRole: CrewRole;
  expiresMs: number;
}

export interface StationCrew {
  members: CrewMember[];
  /** Empty for operators. */
  invitations: OpenInvitation[];
}
