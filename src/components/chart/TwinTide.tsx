import { useId, useRef, type KeyboardEvent, type PointerEvent } from 'react';
import { formatClock } from '../../domain/time/format';
import { HOUR_MS, MINUTE_MS, type Interval } from '../../domain/time/interval';
import type { QualityBand } from '../../domain/window/qualityBands';
import type { TakenSlot } from '../../domain/window/searchData';
import { Hatches } from './Hatches';
import { round } from './rasterGeometry';
import {
  hourStep,
  tideArea,
  tideCurve,
  tideHours,
  tideInstant,
  tideX,
  type ElevationPoint,
  type TideFrame,
} from './tideGeometry';

export interface TideStation {
  callSign: string;
  points: ElevationPoint[];
}

interface Props extends Interval {
  width: number;
  stations: TideStation[];
  /** The counted windows in view, cut by step. */
  bands: QualityBand[];
  /** Moon over every horizon, yet hidden or too low for somebody. */
  hidden: Interval[];
  taken?: TakenSlot[] | undefined;
  cursorMs: number;
  slot?: Interval | null | undefined;
  /** Absent: a still picture. */
  onCursor?: ((atMs: number) => void) | undefined;
  onSlot?: ((slot: Interval) => void) | undefined;
}

const STEP_MS = 5 * MINUTE_MS;
const TOP = 40;
const STRIP = 40;
const STRIP_GAP = 26;
const TWIN_STRIP = 56;

/**
 * Elevations against time: two stations mirrored about one axis, more of them in strips under one another.
 * The shared part is filled by quality. One hand; a chosen slot with two handles.
 */
export function TwinTide(props: Props) {
  const { width, stations, bands, hidden, cursorMs, slot, onCursor, onSlot } = props;
  const prefix = useId().replaceAll(':', '');
  const svg = useRef<SVGSVGElement>(null);
  const frame: TideFrame = {
    startMs: props.startMs,
    endMs: props.endMs,
    width,
    left: 0,
    right: width - 30,
  };
  const twin = stations.length === 2;
  const scaleTo = scaleDegrees(stations);
  const strip = twin ? TWIN_STRIP : STRIP;
  const pixels = strip / scaleTo;
  const layout = stations.map((station, index) => ({
    ...station,
    axisY: twin ? TOP + TWIN_STRIP : TOP + strip + index * (strip + STRIP_GAP),
    direction: twin && index === 1 ? (1 as const) : (-1 as const),
  }));
  const bottom = twin
    ? TOP + 2 * TWIN_STRIP
    : TOP + stations.length * (strip + STRIP_GAP) - STRIP_GAP;
  const labelled = (props.taken ?? []).length > 0;
  const hoursY = bottom + 20;
  const height = hoursY + (labelled ? 24 : 6);

  const instantOf = (event: PointerEvent) => {
    const box = svg.current!.getBoundingClientRect();
    return tideInstant(frame, ((event.clientX - box.left) * width) / box.width);
  };
  const drag = (move: (atMs: number) => void) => ({
    onPointerDown: (event: PointerEvent<SVGElement>) => {
      event.currentTarget.setPointerCapture(event.pointerId);
      event.stopPropagation();
      move(instantOf(event));
    },
    onPointerMove: (event: PointerEvent<SVGElement>) => {
      if (event.currentTarget.hasPointerCapture(event.pointerId)) move(instantOf(event));
    },
  });
  const snap = (atMs: number) => Math.round(atMs / STEP_MS) * STEP_MS;
  const step = hourStep(frame);
  const nearLabel = Math.min(Math.max(tideX(frame, cursorMs), 34), width - 36);

  return (
    <svg
      ref={svg}
      className="chart tide"
      viewBox={`0 0 ${width} ${height}`}
      width={width}
      height={height}
      role={onCursor ? 'group' : 'img'}
      aria-label={`Elevation of the Moon at ${stations.map((station) => station.callSign).join(', ')}`}
    >
      <Hatches prefix={prefix} />
      <g aria-hidden="true" {...(onCursor ? drag((atMs) => onCursor(atMs)) : {})}>
        <rect className="tide__sea" x={0} y={TOP - 6} width={width} height={bottom - TOP + 12} />
        {layout.map(({ callSign, points, axisY, direction }) => (
          <g key={callSign}>
            <path
              className="tide__ground"
              d={tideArea(frame, points, frame, axisY, direction, pixels)}
            />
            {hidden.map((part) => (
              <path
                key={part.startMs}
                fill={`url(#${prefix}-hz)`}
                d={tideArea(frame, points, part, axisY, direction, pixels)}
              />
            ))}
            {bands.map((band) => (
              <path
                key={band.startMs}
                className={`band band--${band.step}`}
                d={tideArea(frame, points, band, axisY, direction, pixels)}
              />
            ))}
            <path className="tide__curve" d={tideCurve(frame, points, axisY, direction, pixels)} />
            {ringDegrees(scaleTo).map((degrees) => (
              <g key={degrees}>
                <path
                  className="tide__ring"
                  d={`M0 ${round(axisY + direction * degrees * pixels)}H${frame.right}`}
                />
                <text x={width} y={axisY + direction * degrees * pixels + 4} textAnchor="end">
                  {degrees}°
                </text>
              </g>
            ))}
            <path className="tide__axis" d={`M0 ${axisY}H${frame.right}`} />
            <path
              className="tide__axis"
              d={tideHours(frame, 1)
                .map((hour) => `M${round(tideX(frame, hour))} ${axisY - 3}v6`)
                .join('')}
            />
            <text
              x={0}
              y={direction === -1 ? axisY - strip - 4 : axisY + strip + 2}
              className="halo"
            >
              {callSign} elevation
            </text>
          </g>
        ))}
        {tideHours(frame, step).map((hour) => (
          <text key={hour} x={tideX(frame, hour)} y={hoursY} textAnchor="middle" className="halo">
            {formatClock(hour).slice(0, 2)}
          </text>
        ))}
        {(props.taken ?? []).map((item) => (
          <Frame
            key={item.startMs}
            frame={frame}
            interval={item}
            top={TOP - 6}
            bottom={bottom + 6}
            className={`taken taken--${item.state}`}
            label={
              item.partner
                ? `${item.state === 'agreed' ? 'sked' : 'offer'}, ${item.partner}`
                : 'taken'
            }
          />
        ))}
      </g>
      {slot ? (
        <g>
          <Frame
            frame={frame}
            interval={slot}
            top={TOP - 6}
            bottom={bottom + 6}
            className="tide__slot"
          />
          {onSlot
            ? (['startMs', 'endMs'] as const).map((edge) => (
                <Handle
                  key={edge}
                  x={tideX(frame, slot[edge])}
                  y={(TOP + bottom) / 2}
                  label={edge === 'startMs' ? 'Start of the slot' : 'End of the slot'}
                  atMs={slot[edge]}
                  frame={frame}
                  drag={drag((atMs) => onSlot({ ...slot, [edge]: snap(atMs) }))}
                  onStep={(steps) => onSlot({ ...slot, [edge]: slot[edge] + steps * STEP_MS })}
                />
              ))
            : null}
        </g>
      ) : null}
      <g className="hand-group">
        <path
          aria-hidden="true"
          className="hand__halo"
          d={`M${round(tideX(frame, cursorMs))} ${TOP - 8}V${bottom + 8}`}
        />
        <path
          aria-hidden="true"
          className="hand"
          d={`M${round(tideX(frame, cursorMs))} ${TOP - 8}V${bottom + 8}`}
        />
        <path
          aria-hidden="true"
          className="hand__knob"
          d={`M${round(tideX(frame, cursorMs)) - 5} ${TOP - 14}h10l-5 7z`}
        />
        <text
          aria-hidden="true"
          className="chart__strong halo"
          x={nearLabel}
          y={TOP - 19}
          textAnchor="middle"
        >
          {formatClock(cursorMs)} UTC
        </text>
        {onCursor ? (
          <rect
            className="grip"
            x={tideX(frame, cursorMs) - 12}
            y={TOP - 16}
            width={24}
            height={24}
            {...slider('Time cursor', cursorMs, frame)}
            {...drag((atMs) => onCursor(atMs))}
            onKeyDown={(event) => onArrow(event, (steps) => onCursor(cursorMs + steps * STEP_MS))}
          />
        ) : null}
      </g>
    </svg>
  );
}

/** Full height of a strip in degrees: the next whole 30° over the highest point. */
function scaleDegrees(stations: readonly TideStation[]): number {
  let highest = 30;
  for (const { points } of stations) {
    for (const point of points) highest = Math.max(highest, point.elevationDeg);
  }
  return Math.min(90, Math.ceil(highest / 30) * 30);
}

function ringDegrees(scaleTo: number): number[] {
  return scaleTo >= 60 ? [30, 60] : [30];
}

function slider(label: string, atMs: number, frame: TideFrame) {
  return {
    role: 'slider',
    tabIndex: 0,
    'aria-label': label,
    'aria-valuemin': 0,
    'aria-valuemax': Math.round((frame.endMs - frame.startMs) / MINUTE_MS),
    'aria-valuenow': Math.round((atMs - frame.startMs) / MINUTE_MS),
    'aria-valuetext': `${formatClock(atMs)} UTC`,
  };
}

/** Arrows step by five minutes, with Page by an hour. */
function onArrow(event: KeyboardEvent, move: (steps: number) => void): void {
  const hour = HOUR_MS / STEP_MS;
  const steps = {
    ArrowLeft: -1,
    ArrowDown: -1,
    ArrowRight: 1,
    ArrowUp: 1,
    PageDown: -hour,
    PageUp: hour,
  }[event.key];
  if (steps === undefined) return;
  event.preventDefault();
  move(steps);
}

function Frame({
  frame,
  interval,
  top,
  bottom,
  className,
  label,
}: {
  frame: TideFrame;
  interval: Interval;
  top: number;
  bottom: number;
  className: string;
  label?: string;
}) {
  const startMs = Math.max(interval.startMs, frame.startMs);
  const endMs = Math.min(interval.endMs, frame.endMs);
  if (endMs <= startMs) return null;
  const x = round(tideX(frame, startMs));
  const d = `M${x} ${top}H${round(tideX(frame, endMs))}V${bottom}H${x}Z`;
  return (
    <g aria-hidden="true">
      <path className="taken__halo" d={d} />
      <path className={className} d={d} />
      {label ? (
        <text
          x={(x + tideX(frame, endMs)) / 2}
          y={bottom + 32}
          textAnchor="middle"
          className="halo"
        >
          {label}
        </text>
      ) : null}
    </g>
  );
}

function Handle({
  x,
  y,
  label,
  atMs,
  frame,
  drag,
  onStep,
}: {
  x: number;
  y: number;
  label: string;
  atMs: number;
  frame: TideFrame;
  drag: object;
  onStep: (steps: number) => void;
}) {
  return (
    <g>
      <rect
        aria-hidden="true"
        className="tide__handle"
        x={x - 4}
        y={y - 10}
        width={8}
        height={20}
        rx={2}
      />
      <rect
        className="grip"
        x={x - 12}
        y={y - 18}
        width={24}
        height={36}
        {...slider(label, atMs, frame)}
        {...drag}
        onKeyDown={(event) => onArrow(event, onStep)}
      />
    </g>
  );
}
