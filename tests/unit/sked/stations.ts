import type { SheetSked, SheetStation } from '~/domain/sked/hourSheet';
import { HOUR_MS } from '~/domain/time/interval';
import { SETUP, UP_MS } from '../link/stations';

export const NORTH: SheetStation = {
  callSign: 'QA1LUN',
  site: { latitudeDeg: 50, longitudeDeg: 10, heightM: 0 },
  sky: {},
  setup: SETUP,
};

export const WEST: SheetStation = {
  callSign: 'QB7TID',
  site: { latitudeDeg: 40, longitudeDeg: -75, heightM: 0 },
  sky: {},
  setup: { ...SETUP, powerAtFeedW: 100 },
};

export const SOUTH: SheetStation = {
  callSign: 'QC2FAR',
  site: { latitudeDeg: 10, longitudeDeg: -20, heightM: 0 },
  sky: {},
  setup: SETUP,
};

/** An hour in which the Moon is up for all of them. */
export const SKED: SheetSked = {
  startMs: UP_MS - HOUR_MS / 2,
  endMs: UP_MS + HOUR_MS / 2,
  frequencyMhz: 1296,
  mode: 'q65-60c',
  eastFirst: true,
  convention: 'constantAtMoon',
};
