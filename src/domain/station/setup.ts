/** A station's equipment on one band, as the link budget reads it. */
export type Polarization =
  'horizontal' | 'vertical' | 'rightCircular' | 'leftCircular' | 'rotatable';

export type Antenna =
  | { kind: 'dish'; diameterM: number; apertureEfficiency: number }
  | { kind: 'gain'; gainDbi: number; beamwidthDeg?: number | undefined };

/** One stage from the feed towards the receiver: an amplifier, or a loss at a physical temperature. */
export type ReceiveStage =
  | { kind: 'amplifier'; name?: string | undefined; gainDb: number; noiseFigureDb: number }
  | {
      kind: 'loss';
      name?: string | undefined;
      lossDb: number;
      physicalTemperatureK?: number | undefined;
    };

/**
 * `measured`: system temperature on cold sky away from the Moon; with `fromNewestRecord` that of the band's newest
 * noise record, which the server puts in whenever the equipment is read. `stages`: in order, feed first.
 */
export type ReceiveChain =
  | { kind: 'measured'; systemTemperatureK: number; fromNewestRecord?: true | undefined }
  | { kind: 'stages'; stages: ReceiveStage[]; spilloverK?: number | undefined };

export interface BandSetup {
  antenna: Antenna;
  polarization: Polarization;
  powerAtFeedW: number;
  receive: ReceiveChain;
}
