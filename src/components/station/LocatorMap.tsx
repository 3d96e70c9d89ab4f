import { useEffect, useMemo, useState } from 'react';
import { geoAzimuthalEquidistant, geoGraticule, geoPath } from 'd3-geo';
import type { FeatureCollection, Polygon } from 'geojson';
import type { LocatorCell, Position } from '../../domain/locator/locator';
import { formatPosition } from '../../domain/time/format';
import { loadedLand, loadLand } from '../chart/land';

interface Props {
  position: Position;
  /** The cell that is marked, and its name. */
  cell: LocatorCell;
  cellName: string;
}

const WIDTH = 420;
const HEIGHT = 300;
/** From the middle to the edge, degrees of a great circle. */
const REACH_DEG = 16;

/** A map of the surroundings with the locator's cell marked; coastlines only, loaded when first shown. */
export function LocatorMap({ position, cell, cellName }: Props) {
  const [coast, setCoast] = useState<FeatureCollection | null>(loadedLand);
  useEffect(() => {
    let stays = true;
    loadLand().then(
      (loaded) => stays && setCoast(loaded),
      () => undefined,
    );
    return () => {
      stays = false;
    };
  }, []);

  const draw = useMemo(() => {
    const projection = geoAzimuthalEquidistant()
      .rotate([-position.longitudeDeg, -position.latitudeDeg])
      .translate([WIDTH / 2, HEIGHT / 2])
      .scale((WIDTH / 2 / REACH_DEG) * (180 / Math.PI))
      .clipAngle(REACH_DEG * 1.6)
      .precision(0.2);
    return { path: geoPath(projection).digits(1), project: projection };
  }, [position.latitudeDeg, position.longitudeDeg]);

  const fields = geoGraticule().step([20, 10]);
  const squares = geoGraticule()
    .step([2, 1])
    .extent([
      [position.longitudeDeg - 40, Math.max(-89, position.latitudeDeg - 18)],
      [position.longitudeDeg + 40, Math.min(89, position.latitudeDeg + 18)],
    ]);
  const corner = draw.project([cell.west, cell.north]);
  const opposite = draw.project([cell.east, cell.south]);
  const tiny =
    corner !== null &&
    opposite !== null &&
    Math.hypot(corner[0] - opposite[0], corner[1] - opposite[1]) < 8;
  const middle = draw.project([(cell.west + cell.east) / 2, (cell.south + cell.north) / 2]);
  return (
    <figure className="m-0 grid gap-1">
      <svg
        viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
        className="chart map overflow-hidden border border-rule2"
        role="img"
        aria-label={`Map around ${cellName}, ${formatPosition(position)}`}
      >
        <rect className="map__sea" width={WIDTH} height={HEIGHT} />
        {coast ? <path className="map__land" d={draw.path(coast) ?? ''} /> : null}
        <path className="map__grid" d={draw.path(squares()) ?? ''} opacity={0.45} />
        <path className="map__grid" d={draw.path(fields()) ?? ''} />
        <path className="map__cell" d={draw.path(polygonOf(cell)) ?? ''} />
        {tiny && middle ? (
          <circle className="map__cell" cx={middle[0]} cy={middle[1]} r={6} />
        ) : null}
        <path
          className="map__place"
          d={`M${WIDTH / 2 - 12} ${HEIGHT / 2}h7m10 0h7M${WIDTH / 2} ${HEIGHT / 2 - 12}v7m0 10v7`}
        />
      </svg>
      <figcaption className="label">
        {coast
          ? `${cellName} is marked. Lines part locator squares of 2° by 1°.`
          : 'Loading coastlines.'}
      </figcaption>
    </figure>
  );
}

/** Clockwise as d3 wants the outside of a small area to be. */
function polygonOf({ west, east, south, north }: LocatorCell): Polygon {
  return {
    type: 'Polygon',
    coordinates: [
      [
        [west, south],
        [west, north],
        [east, north],
        [east, south],
        [west, south],
      ],
    ],
  };
}
