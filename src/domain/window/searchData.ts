import type { GuestPlace } from '../guest/guest';
import type { SkedState } from '../sked/types';
import type { BandId } from '../station/bands';
import type { BandSetup } from '../station/setup';
import type { BandEquipment } from '../station/views';
import type { Interval } from '../time/interval';
import type { WindowStation } from './types';

/** A station of the question as the windows page needs it. `callSign` is unique within one question. */
export interface ChosenStation extends WindowStation {
  /** What stands for it in the address. */
  token: string;
  /** Its id where it is listed; null for a bare place. */
  id: string | null;
  /** What its keepers call the place ("Baltic coast"). */
  placeName: string | null;
  locator: string;
  /** Null where only a locator was given. */
  timeZone: string | null;
  /** Every band, as on its public page; empty for a bare place. */
  equipment: BandEquipment[];
  /** Whether the viewer belongs to its crew. */
  own: boolean;
  /** Set for somebody without an account, who can be offered a sked by mail. */
  guest?: GuestPlace | undefined;
}

/** The station's equipment on a band, or null. */
export function setupOn(station: Pick<ChosenStation, 'equipment'>, band: BandId): BandSetup | null {
  return station.equipment.find((one) => one.band === band)?.setup ?? null;
}

/** A station that can be chosen from the list. */
export interface StationChoice {
  id: string;
  callSign: string;
  placeName: string | null;
  own: boolean;
}

/** A stretch in which one of the chosen stations has a sked already. */
export interface TakenSlot extends Interval {
  state: Extract<SkedState, 'offered' | 'agreed'>;
  /** Of the chosen stations, who is bound. */
  callSigns: string[];
  /** The sked's id where the viewer may open it. */
  skedId: string | null;
  /** With whom, where the viewer may know. */
  partner: string | null;
}

/** What the server knows about the stations of a question within its dates. */
export interface SearchData {
  stations: ChosenStation[];
  taken: TakenSlot[];
}
