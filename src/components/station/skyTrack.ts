/** A point of the Moon's path over a station; `hour` ("20") where it is to be numbered. */
export interface TrackPoint {
  timeMs: number;
  azimuthDeg: number;
  elevationDeg: number;
  hour?: string | undefined;
}
