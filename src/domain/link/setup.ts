import type { Site } from '../sky/limits';
import type { Antenna, Polarization, ReceiveChain } from '../station/setup';

/** A receive chain as stored, or the bare receiver noise at the feed's flange without sky, ground and Moon. */
export type LinkReceive =
  | ReceiveChain
  | { kind: 'receiver'; receiverTemperatureK: number; spilloverK?: number | undefined };

/** What the budget needs to know of one station's equipment. Every stored `BandSetup` is one. */
export interface LinkSetup {
  antenna: Antenna;
  polarization: Polarization;
  powerAtFeedW: number;
  receive: LinkReceive;
  /** How far the antenna points beside the Moon, degrees; absent: 0. */
  pointingErrorDeg?: number | undefined;
}

export interface LinkStation {
  /** Names the station in the answer; absent: "A" or "B". */
  callSign?: string | undefined;
  site: Site;
  setup: LinkSetup;
}
