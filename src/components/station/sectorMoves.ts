import { azimuthWidthDeg, type BlockedSector } from '../../domain/sky';

export interface Direction {
  azimuthDeg: number;
  elevationDeg: number;
}

export type SectorEdge = 'azimuthFrom' | 'azimuthTo' | 'elevationFrom' | 'elevationTo';

const wrap = (azimuthDeg: number) => ((azimuthDeg % 360) + 360) % 360;
/** To a tenth, so that steps of 1° do not gather rounding. */
const tenth = (value: number) => Math.round(value * 10) / 10;

/** Whether all four numbers are there, so that it can be drawn. */
export function isDrawable(sector: BlockedSector): boolean {
  const { azimuthFromDeg, azimuthToDeg, elevationFromDeg, elevationToDeg } = sector;
  return (
    [azimuthFromDeg, azimuthToDeg, elevationFromDeg, elevationToDeg].every(Number.isFinite) &&
    elevationToDeg > elevationFromDeg
  );
}

/** Moves the whole sector; it stays between horizon and zenith and keeps its size. */
export function moveSector(
  sector: BlockedSector,
  { azimuthDeg, elevationDeg }: Direction,
): BlockedSector {
  const up = Math.min(
    Math.max(elevationDeg, Math.min(0, -sector.elevationFromDeg)),
    Math.max(0, 90 - sector.elevationToDeg),
  );
  const full = azimuthWidthDeg(sector.azimuthFromDeg, sector.azimuthToDeg) >= 360;
  const turn = full ? 0 : azimuthDeg;
  return {
    ...sector,
    azimuthFromDeg: full ? sector.azimuthFromDeg : tenth(wrap(sector.azimuthFromDeg + turn)),
    azimuthToDeg: full ? sector.azimuthToDeg : tenth(wrap(sector.azimuthToDeg + turn)),
    elevationFromDeg: tenth(sector.elevationFromDeg + up),
    elevationToDeg: tenth(sector.elevationToDeg + up),
  };
}

/** Puts one edge to the direction; a sector keeps at least 1° each way. */
export function moveEdge(
  sector: BlockedSector,
  edge: SectorEdge,
  { azimuthDeg, elevationDeg }: Direction,
): BlockedSector {
  const elevation = tenth(Math.min(90, Math.max(0, elevationDeg)));
  const azimuth = tenth(wrap(azimuthDeg));
  switch (edge) {
    case 'elevationFrom':
      return { ...sector, elevationFromDeg: Math.min(elevation, sector.elevationToDeg - 1) };
    case 'elevationTo':
      return { ...sector, elevationToDeg: Math.max(elevation, sector.elevationFromDeg + 1) };
    case 'azimuthFrom':
      return wideEnough(azimuth, sector.azimuthToDeg)
        ? { ...sector, azimuthFromDeg: azimuth }
        : sector;
    case 'azimuthTo':
      return wideEnough(sector.azimuthFromDeg, azimuth)
        ? { ...sector, azimuthToDeg: azimuth }
        : sector;
  }
}

function wideEnough(fromDeg: number, toDeg: number): boolean {
  const widthDeg = wrap(toDeg - fromDeg);
  return widthDeg >= 1 && widthDeg <= 359;
}

/** The sector between two opposite corners, the short way round; one of handy size for a mere press. */
export function sectorBetween(start: Direction, end: Direction): BlockedSector {
  const round = (value: number) => Math.round(value);
  const clamp = (value: number) => Math.min(90, Math.max(0, round(value)));
  const turnDeg = wrap(end.azimuthDeg - start.azimuthDeg + 180) - 180;
  const heightDeg = Math.abs(end.elevationDeg - start.elevationDeg);
  if (Math.abs(turnDeg) < 1.5 && heightDeg < 1.5) {
    const low = Math.min(75, Math.max(0, round(start.elevationDeg - 7)));
    return {
      azimuthFromDeg: wrap(round(start.azimuthDeg - 10)),
      azimuthToDeg: wrap(round(start.azimuthDeg + 10)),
      elevationFromDeg: low,
      elevationToDeg: low + 15,
    };
  }
  const [from, to] = turnDeg >= 0 ? [start, end] : [end, start];
  const azimuthFromDeg = wrap(round(from.azimuthDeg));
  const azimuthToDeg = wrap(round(to.azimuthDeg));
  const elevationFromDeg = Math.min(89, clamp(Math.min(start.elevationDeg, end.elevationDeg)));
  return {
    azimuthFromDeg,
    azimuthToDeg: azimuthToDeg === azimuthFromDeg ? wrap(azimuthFromDeg + 1) : azimuthToDeg,
    elevationFromDeg,
    elevationToDeg: Math.max(
      elevationFromDeg + 1,
      clamp(Math.max(start.elevationDeg, end.elevationDeg)),
    ),
  };
}

/** Where the handle of an edge stands. */
export function edgeDirection(sector: BlockedSector, edge: SectorEdge): Direction {
  const { azimuthFromDeg, azimuthToDeg, elevationFromDeg, elevationToDeg } = sector;
  const middleAzimuth = wrap(azimuthFromDeg + azimuthWidthDeg(azimuthFromDeg, azimuthToDeg) / 2);
  const low = Math.max(0, elevationFromDeg);
  switch (edge) {
    case 'azimuthFrom':
      return { azimuthDeg: azimuthFromDeg, elevationDeg: (low + elevationToDeg) / 2 };
    case 'azimuthTo':
      return { azimuthDeg: azimuthToDeg, elevationDeg: (low + elevationToDeg) / 2 };
    case 'elevationFrom':
      return { azimuthDeg: middleAzimuth, elevationDeg: low };
    case 'elevationTo':
      return { azimuthDeg: middleAzimuth, elevationDeg: elevationToDeg };
  }
}
