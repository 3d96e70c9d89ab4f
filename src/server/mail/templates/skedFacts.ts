import { bandById } from '../../../domain/station/bands';
import { modeById } from '../../../domain/station/modes';
import { formatFrequency } from '../../../domain/sked/frequency';
import type { Interval } from '../../../domain/time/interval';
import { paths } from '../../../paths';
import type { SkedRow } from '../../db/tables';

/** What every mail and calendar entry about a sked says. */
export interface SkedMailFacts extends Interval {
  uid: string;
  url: string;
  sheetUrl: string;
  bandLabel: string;
  frequency: string;
  modeLabel: string;
  stations: { callSign: string; timeZone: string; locator: string }[];
}

export interface SkedRecipient {
  personId: string;
  email: string;
  name: string;
  timeZone: string;
  /** Whether the person has no account and keeps a guest station. */
  guest: boolean;
  /** Stations of the sked to whose crew the person belongs. */
  stationIds: string[];
}

export function skedFacts(
  row: Pick<SkedRow, 'id' | 'uid' | 'band' | 'mode' | 'frequency_mhz'>,
  stations: SkedMailFacts['stations'],
  slot: Interval,
  url: string,
): SkedMailFacts {
  return {
    uid: row.uid,
    url,
    sheetUrl: new URL(paths.skedSheet(row.id), url).href,
    bandLabel: bandById(row.band).label,
    frequency: formatFrequency(row.frequency_mhz),
    modeLabel: modeById(row.mode).label,
    stations: stations.map(({ callSign, timeZone, locator }) => ({ callSign, timeZone, locator })),
    startMs: slot.startMs,
    endMs: slot.endMs,
  };
}
