import { useId, useRef, useState, type KeyboardEvent, type PointerEvent } from 'react';
import type { BlockedSector, HorizonPoint, SkyLimits } from '../../domain/sky';
import { formatAngle } from '../../domain/time/format';
import {
  domeDirection,
  domeLine,
  domePoint,
  horizonPath,
  patchPath,
  runsAboveHorizon,
} from '../chart/domeGeometry';
import { Hatches } from '../chart/Hatches';
import { DOME_RADIUS, SkyDome } from '../chart/SkyDome';
import { SectorHandles } from './SectorHandles';
import { isDrawable, moveSector, sectorBetween, type Direction } from './sectorMoves';
import type { TrackPoint } from './skyTrack';

interface Props {
  sky: SkyLimits;
  selected: number | null;
  drawing: boolean;
  /** The Moon's path of the coming day. */
  track: TrackPoint[];
  /** A horizon that is looked at but not taken yet. */
  preview?: HorizonPoint[] | undefined;
  onSelect: (index: number | null) => void;
  /** `step` names what one undo takes back together. */
  onSector: (index: number, sector: BlockedSector, step: string) => void;
  onDraw: (sector: BlockedSector) => void;
  onRemove: (index: number) => void;
  /** A pull has ended: the next change is a step of its own. */
  onRest: () => void;
}

const ARROWS: Record<string, Direction> = {
  ArrowLeft: { azimuthDeg: -1, elevationDeg: 0 },
  ArrowRight: { azimuthDeg: 1, elevationDeg: 0 },
  ArrowUp: { azimuthDeg: 0, elevationDeg: 1 },
  ArrowDown: { azimuthDeg: 0, elevationDeg: -1 },
};

/** The sky dome on which blocked sectors are drawn, moved and resized, by pointer and by keyboard. */
export function SkyDomeEditor(props: Props) {
  const { sky, selected, drawing, track, preview, onSelect, onSector, onDraw, onRemove, onRest } =
    props;
  const svg = useRef<SVGSVGElement>(null);
  const [corners, setCorners] = useState<{ start: Direction; end: Direction } | null>(null);
  const pull = useRef<{ index: number; at: Direction; sector: BlockedSector } | null>(null);
  const prefix = `edit${useId().replaceAll(/[^a-zA-Z0-9]/g, '')}`;
  const sectors = sky.blocked ?? [];

  const directionOf = (event: PointerEvent): Direction => {
    const matrix = svg.current?.getScreenCTM();
    if (!matrix) return { azimuthDeg: 0, elevationDeg: 90 };
    const point = new DOMPoint(event.clientX, event.clientY).matrixTransform(matrix.inverse());
    return domeDirection(point, DOME_RADIUS);
  };

  const drawHandlers = {
    onPointerDown: (event: PointerEvent<SVGSVGElement>) => {
      const start = directionOf(event);
      if (!drawing) {
        if (event.target === event.currentTarget || !isSector(event.target)) onSelect(null);
        return;
      }
      if (start.elevationDeg < -4) return;
      event.preventDefault();
      event.currentTarget.setPointerCapture(event.pointerId);
      setCorners({ start, end: start });
    },
    onPointerMove: (event: PointerEvent<SVGSVGElement>) => {
      if (corners) setCorners({ start: corners.start, end: directionOf(event) });
    },
    onPointerUp: (event: PointerEvent<SVGSVGElement>) => {
      if (!corners) return;
      onDraw(sectorBetween(corners.start, directionOf(event)));
      setCorners(null);
    },
    onPointerCancel: () => setCorners(null),
  };

  const sectorHandlers = (index: number, sector: BlockedSector) => ({
    onPointerDown: (event: PointerEvent<SVGPathElement>) => {
      if (drawing) return;
      event.stopPropagation();
      const before = selected === index;
      onSelect(index);
      if (!before && event.pointerType === 'touch') return;
      event.currentTarget.setPointerCapture(event.pointerId);
      pull.current = { index, at: directionOf(event), sector };
    },
    onPointerMove: (event: PointerEvent<SVGPathElement>) => {
      const held = pull.current;
      if (!held || held.index !== index) return;
      const to = directionOf(event);
      const by = {
        azimuthDeg: Math.round(to.azimuthDeg - held.at.azimuthDeg),
        elevationDeg: Math.round(to.elevationDeg - held.at.elevationDeg),
      };
      onSector(index, moveSector(held.sector, by), `pull ${index}`);
    },
    onPointerUp: () => {
      pull.current = null;
      onRest();
    },
    onPointerCancel: () => {
      pull.current = null;
      onRest();
    },
    onFocus: () => onSelect(index),
    onKeyDown: (event: KeyboardEvent) => {
      const arrow = ARROWS[event.key];
      if (arrow) {
        event.preventDefault();
        const by = event.shiftKey ? 5 : 1;
        const step = { azimuthDeg: arrow.azimuthDeg * by, elevationDeg: arrow.elevationDeg * by };
        onSector(index, moveSector(sector, step), `keys ${index}`);
      } else if (event.key === 'Delete' || event.key === 'Backspace') {
        event.preventDefault();
        onRemove(index);
      }
    },
  });

  const chosen = selected === null ? undefined : sectors[selected];
  return (
    <SkyDome
      ref={svg}
      sky={drawableSky(sky)}
      withoutSectors
      label="Sky of the station. North is up, east is right, the zenith in the middle."
      className={drawing ? 'dome--drawing' : undefined}
      svg={drawHandlers}
      underlay={
        preview ? (
          <path className="dome__preview" d={horizonPath({ horizon: preview }, DOME_RADIUS)} />
        ) : null
      }
    >
      <Hatches prefix={prefix} />
      <MoonTrack track={track} />
      {sectors.map((sector, index) =>
        isDrawable(sector) ? (
          <path
            key={index}
            className="dome__sector"
            fill={`url(#${prefix}-hz)`}
            fillRule="evenodd"
            pointerEvents="all"
            d={patchPath(sector, DOME_RADIUS)}
            role="button"
            tabIndex={0}
            aria-pressed={selected === index}
            aria-label={`${sectorName(sector, index)}, azimuth ${formatAngle(sector.azimuthFromDeg)} to ${formatAngle(sector.azimuthToDeg)}, elevation ${formatAngle(sector.elevationFromDeg)} to ${formatAngle(sector.elevationToDeg)}. Arrow keys move it, Delete removes it.`}
            {...sectorHandlers(index, sector)}
          />
        ) : null,
      )}
      {chosen && selected !== null && isDrawable(chosen) && !drawing ? (
        <SectorHandles
          sector={chosen}
          name={sectorName(chosen, selected)}
          directionOf={directionOf}
          onChange={(sector, step) => onSector(selected, sector, `${step} ${selected}`)}
          onRest={onRest}
        />
      ) : null}
      {corners ? (
        <path
          className="dome__draft"
          d={patchPath(sectorBetween(corners.start, corners.end), DOME_RADIUS)}
        />
      ) : null}
    </SkyDome>
  );
}

export function sectorName(sector: BlockedSector, index: number): string {
  return sector.name?.trim() || `Sector ${index + 1}`;
}

function isSector(target: EventTarget): boolean {
  return target instanceof Element && target.closest('.dome__sector, .dome__handles') !== null;
}

/** Without what is half typed. */
function drawableSky(sky: SkyLimits): SkyLimits {
  const finite = (value: number | undefined) =>
    value !== undefined && Number.isFinite(value) ? value : undefined;
  return {
    elevationFromDeg: finite(sky.elevationFromDeg),
    elevationToDeg: finite(sky.elevationToDeg),
    azimuthFromDeg: finite(sky.azimuthFromDeg),
    azimuthToDeg: finite(sky.azimuthToDeg),
    transmitElevationFromDeg: finite(sky.transmitElevationFromDeg),
    horizon: sky.horizon?.filter(
      (point) => Number.isFinite(point.azimuthDeg) && Number.isFinite(point.elevationDeg),
    ),
  };
}

/** Faint, for orientation; every fourth hour is numbered on the inner side. */
function MoonTrack({ track }: { track: TrackPoint[] }) {
  return (
    <g pointerEvents="none" aria-hidden="true">
      {runsAboveHorizon(track).map((run) => (
        <path key={run[0]!.timeMs} className="dome__track" d={domeLine(run, DOME_RADIUS)} />
      ))}
      {track
        .filter((point) => point.hour !== undefined && point.elevationDeg > 8)
        .map((point) => {
          const { x, y } = domePoint(point.azimuthDeg, point.elevationDeg + 6, DOME_RADIUS);
          return (
            <text key={point.timeMs} className="dome__hour" x={x} y={y + 3} textAnchor="middle">
              {point.hour}
            </text>
          );
        })}
    </g>
  );
}
