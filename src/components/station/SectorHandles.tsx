import type { KeyboardEvent, PointerEvent } from 'react';
import type { BlockedSector } from '../../domain/sky';
import { formatAngle } from '../../domain/time/format';
import { domePoint } from '../chart/domeGeometry';
import { DOME_RADIUS } from '../chart/SkyDome';
import { edgeDirection, moveEdge, type Direction, type SectorEdge } from './sectorMoves';

interface Props {
  sector: BlockedSector;
  name: string;
  directionOf: (event: PointerEvent) => Direction;
  onChange: (sector: BlockedSector, step: string) => void;
  onRest: () => void;
}

const EDGES: { edge: SectorEdge; field: keyof BlockedSector; words: string; most: number }[] = [
  { edge: 'azimuthFrom', field: 'azimuthFromDeg', words: 'azimuth from', most: 360 },
  { edge: 'azimuthTo', field: 'azimuthToDeg', words: 'azimuth to', most: 360 },
  { edge: 'elevationFrom', field: 'elevationFromDeg', words: 'elevation from', most: 90 },
  { edge: 'elevationTo', field: 'elevationToDeg', words: 'elevation to', most: 90 },
];

/** Four handles at the edges of the chosen sector, each a slider for the keyboard too. */
export function SectorHandles({ sector, name, directionOf, onChange, onRest }: Props) {
  return (
    <g className="dome__handles">
      {EDGES.map(({ edge, field, words, most }) => {
        const at = edgeDirection(sector, edge);
        const { x, y } = domePoint(at.azimuthDeg, at.elevationDeg, DOME_RADIUS);
        const value = sector[field] as number;
        const put = (direction: Direction) => onChange(moveEdge(sector, edge, direction), edge);
        const handlers = {
          onPointerDown: (event: PointerEvent<SVGGElement>) => {
            event.stopPropagation();
            event.preventDefault();
            event.currentTarget.setPointerCapture(event.pointerId);
          },
          onPointerMove: (event: PointerEvent<SVGGElement>) => {
            if (!event.currentTarget.hasPointerCapture(event.pointerId)) return;
            const to = directionOf(event);
            put({
              azimuthDeg: Math.round(to.azimuthDeg),
              elevationDeg: Math.round(to.elevationDeg),
            });
          },
          onPointerUp: onRest,
          onPointerCancel: onRest,
          onKeyDown: (event: KeyboardEvent) => {
            const sign = { ArrowRight: 1, ArrowUp: 1, ArrowLeft: -1, ArrowDown: -1 }[event.key];
            if (!sign) return;
            event.preventDefault();
            const by = sign * (event.shiftKey ? 5 : 1);
            put({ azimuthDeg: value + by, elevationDeg: value + by });
          },
        };
        return (
          <g key={edge} {...handlers}>
            <circle className="dome__reach" cx={x} cy={y} r={11} />
            <circle
              className="dome__handle"
              cx={x}
              cy={y}
              r={4.5}
              role="slider"
              tabIndex={0}
              aria-label={`${name}, ${words}`}
              aria-valuemin={0}
              aria-valuemax={most}
              aria-valuenow={value}
              aria-valuetext={formatAngle(value)}
            />
          </g>
        );
      })}
    </g>
  );
}
