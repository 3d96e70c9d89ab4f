import type { NoiseKey, SignalKey } from '../link/ledger';

/** Sections of the method page, by the anchor of each. */
export type MethodAnchor =
  | 'moon'
  | 'windows'
  | 'path-loss'
  | 'doppler'
  | 'spread'
  | 'polarisation'
  | 'antenna'
  | 'sky'
  | 'atmosphere'
  | 'moon-and-sun'
  | 'degradation'
  | 'margin'
  | 'modes'
  | 'chance'
  | 'receive-chain'
  | 'measured-noise'
  | 'exposure';

/** Figures that stand beside one another on the pages; terms of a ledger have their own names. */
export type FigureId =
  | 'azimuth'
  | 'elevation'
  | 'distance'
  | 'doppler'
  | 'spread'
  | 'polarization'
  | 'degradation'
  | 'systemNoise'
  | 'margin'
  | 'chance'
  | 'window'
  | 'received'
  | 'system'
  | SignalKey
  | NoiseKey;

/** Where the method page says how a figure comes about. */
export const FIGURE_ANCHORS: Readonly<Record<FigureId, MethodAnchor>> = {
  azimuth: 'moon',
  elevation: 'moon',
  distance: 'moon',
  doppler: 'doppler',
  spread: 'spread',
  polarization: 'polarisation',
  degradation: 'degradation',
  systemNoise: 'margin',
  margin: 'margin',
  chance: 'chance',
  window: 'windows',
  received: 'margin',
  system: 'margin',
  transmitPower: 'margin',
  transmitGain: 'antenna',
  transmitPointing: 'antenna',
  atmosphereUp: 'atmosphere',
  pathLoss: 'path-loss',
  beamFill: 'path-loss',
  atmosphereDown: 'atmosphere',
  receivePointing: 'antenna',
  receiveGain: 'antenna',
  noiseFloor: 'margin',
  threshold: 'modes',
  receiver: 'receive-chain',
  measuredSystem: 'measured-noise',
  spillover: 'receive-chain',
  sky: 'sky',
  warmerSky: 'sky',
  atmosphere: 'atmosphere',
  moon: 'moon-and-sun',
  sun: 'moon-and-sun',
};
