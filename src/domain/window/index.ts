/** When the Moon can be used: by one station, or by several at once. */
export { WindowCache } from './cache';
export {
  commonMoonUp,
  findCommonWindows,
  visibleIntervals,
  type CommonUp,
} from './findCommonWindows';
export type { InnerLimit } from './innerLimit';
export { stationTimeline } from './stationTimeline';
export { REASON_ORDER, sweepTimelines, type Stretch } from './sweep';
export { freeIntervals, timelineOfIntervals, type Timeline } from './timeline';
export type * from './types';
