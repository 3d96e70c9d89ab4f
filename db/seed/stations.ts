import type { DemoStation } from './shapes';
import { STATIONS_FAR } from './stationsFar';
import { STATIONS_NEAR } from './stationsNear';

export type { DemoStation } from './shapes';

/**
 * The stations of the demo. Call signs begin with Q, which is never issued; names are landscapes;
 * places are round points chosen at random.
 */
export const DEMO_STATIONS: readonly DemoStation[] = [...STATIONS_NEAR, ...STATIONS_FAR];
