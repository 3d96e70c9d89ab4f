/** Where Moon and Sun are: directly for one instant, or by a table for many instants of one span. */
export { MOON_RADIUS_KM, SPEED_OF_LIGHT_MPS, wrap180, wrap360 } from './constants';
export { moonSampleDirect, type MoonSample } from './direct';
export { moonFootprint, type Footprint } from './footprint';
export { lookAngles, observerAt, type LookAngles, type Observer } from './observer';
export { refracted, refractionDeg, unrefracted } from './refraction';
export { directMoon, type MoonSource } from './source';
export { MoonTable, buildMoonTable } from './table';
export { StationTrack } from './track';
export { directionAngles, moonSamples, moonTrack, tableFor, type TrackPoint } from './samples';
