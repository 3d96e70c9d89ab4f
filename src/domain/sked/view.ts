import type { BandId } from '../station/bands';
import type { ModeId } from '../station/modes';
import type { Interval } from '../time/interval';
import type { PartyAnswer } from './machine';
import type { SkedEventKind, SkedResult, SkedState } from './types';

/** A sked as a list shows it to one person. `mine`: the person belongs to the station's crew. */
export interface SkedSummary extends Interval {
  id: string;
  /** An offer whose time has come counts as lapsed before anybody wrote it down. */
  state: SkedState;
  version: number;
  band: BandId;
  frequencyMhz: number;
  mode: ModeId;
  offeredBy: string;
  /** Those still in it: the viewer's own first, else in the order of the offer. */
  parties: SkedPartyView[];
  /** Stations that dropped out. */
  leftParties: SkedPartyView[];
  /** Whether the viewer has part in it only through stations that dropped out. */
  droppedOut: boolean;
  waitsForViewer: boolean;
  /** Whether a report of one of the viewer's stations is still to come. */
  reportDue: boolean;
  /** Where the parties' results contradict each other, in sentences. */
  disagreements: string[];
}

export interface SkedPartyView {
  stationId: string;
  callSign: string;
  timeZone: string;
  answer: PartyAnswer;
  mine: boolean;
}

export interface SkedEventView extends Interval {
  version: number;
  kind: SkedEventKind;
  callSign: string | null;
  /** Name of the person who acted, where one did. */
  personName: string | null;
  byViewer: boolean;
  words: string;
  atMs: number;
}

export interface SkedReportView {
  stationId: string;
  callSign: string;
  result: SkedResult;
  /** As typed, empty where none was given. */
  reportSent: string;
  reportReceived: string;
  words: string;
  atMs: number;
}

/** For each thing that can be done, the viewer's station on whose behalf, or null where it cannot be done. */
export interface SkedChoices {
  accept: string | null;
  decline: string | null;
  dropOut: string | null;
  withdraw: string | null;
  cancel: string | null;
  move: string | null;
  report: string | null;
}

/** Everything a party sees of its sked. Events are in the order in which they happened. */
export interface SkedView extends SkedSummary {
  events: SkedEventView[];
  reports: SkedReportView[];
  choices: SkedChoices;
}

export const RESULT_WORDS: Record<SkedResult, string> = {
  completed: 'completed',
  partly: 'partly',
  notHeard: 'not heard',
};

/** "QA1LUN and QB7TID", "QA1LUN, QB7TID and QC2FAR". */
export function listOf(names: readonly string[]): string {
  if (names.length < 2) return names.join('');
  return `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
}

/** Call signs of the others as the viewer speaks of the sked: "QB7TID"; all of them when none is the viewer's. */
export function partnersOf(parties: readonly Pick<SkedPartyView, 'callSign' | 'mine'>[]): string {
  const others = parties.filter((party) => !party.mine);
  return listOf((others.length > 0 ? others : parties).map((party) => party.callSign));
}
