/** A place on the WGS 84 ellipsoid. Longitude is counted eastward, −180 … 180; height in metres above it. */
export interface Site {
  latitudeDeg: number;
  longitudeDeg: number;
  heightM: number;
}

/**
 * A part of the sky that the dish cannot use. Azimuths run clockwise from … to … and may pass north.
 * `name` is what stands there ("barn"), for sentences such as "Ends at QA1LUN's barn".
 */
export interface BlockedSector {
  azimuthFromDeg: number;
  azimuthToDeg: number;
  elevationFromDeg: number;
  elevationToDeg: number;
  name?: string | undefined;
}

/** One point of the horizon profile; between points the profile is linear and closes through north. */
export interface HorizonPoint {
  azimuthDeg: number;
  elevationDeg: number;
}

/**
 * What a dish can see. Every limit is optional; an absent one does not limit.
 * Without `elevationFromDeg` and `horizon` the geometric horizon (elevation 0) still limits.
 * `transmitElevationFromDeg` limits a contact too, because every station must transmit.
 */
export interface SkyLimits {
  elevationFromDeg?: number | undefined;
  elevationToDeg?: number | undefined;
  azimuthFromDeg?: number | undefined;
  azimuthToDeg?: number | undefined;
  blocked?: BlockedSector[] | undefined;
  horizon?: HorizonPoint[] | undefined;
  transmitElevationFromDeg?: number | undefined;
}
