import { memo, useId, useMemo } from 'react';
import { subtractIntervals, type Interval } from '../../domain/time/interval';
import { QUALITY_STEPS } from '../../domain/window/quality';
import type { TakenSlot } from '../../domain/window/searchData';
import { Hatches } from './Hatches';
import { RasterBands } from './RasterBands';
import {
  edgesPath,
  linesPath,
  placeOf,
  rasterFrame,
  rectanglesPath,
  rowPieces,
  rowTop,
  type RasterFrame,
} from './rasterGeometry';
import { RasterRows, RasterSums } from './RasterRows';
import { RasterTargets } from './RasterTargets';
import { rasterAxes, type RasterLayers, type RasterStation } from './rasterView';

interface Props {
  fromMs: number;
  days: number;
  width: number;
  stations: RasterStation[];
  layers: RasterLayers;
  taken?: TakenSlot[] | undefined;
  /** Without it no tick is drawn. */
  nowMs?: number | undefined;
  chosen?: number | null | undefined;
  cursorMs?: number | null | undefined;
  slot?: Interval | null | undefined;
  /** What the picture shows, for those who do not see it. */
  label: string;
  /** Absent: a picture that cannot be pressed. */
  onChoose?: ((index: number, atMs: number | null) => void) | undefined;
}

/**
 * The month as a tide table: one row a UTC day, common windows as bands. Every window is a button; arrows walk
 * from one to the next.
 */
export function MonthRaster(props: Props) {
  const { fromMs, days, width, stations, layers, onChoose, label } = props;
  const prefix = useId().replaceAll(':', '');
  const axes = useMemo(() => rasterAxes(stations, fromMs), [stations, fromMs]);
  const frame = useMemo(
    () => rasterFrame(fromMs, days, width, axes.length),
    [fromMs, days, width, axes.length],
  );
  const chosenWindow = layers.windows[props.chosen ?? -1];
  const chosenRow = (chosenWindow && placeOf(frame, chosenWindow.startMs)?.row) ?? null;
  return (
    <svg
      className="chart raster"
      viewBox={`0 0 ${width} ${frame.height}`}
      width={width}
      height={frame.height}
      role={onChoose ? 'group' : 'img'}
      aria-label={label}
    >
      <Hatches prefix={prefix} />
      <Ground frame={frame} stations={stations} />
      <RasterRows frame={frame} axes={axes} phases={layers.phases} chosenRow={chosenRow} />
      <RasterSums frame={frame} days={layers.days} />
      <Layers frame={frame} prefix={prefix} layers={layers} />
      <RasterBands frame={frame} layers={layers} keepClear={overdrawn(props)} />
      <Taken frame={frame} taken={props.taken ?? NONE} />
      <Marks {...props} frame={frame} />
      {onChoose ? (
        <RasterTargets
          frame={frame}
          layers={layers}
          chosen={props.chosen ?? null}
          onChoose={onChoose}
        />
      ) : null}
    </svg>
  );
}

const NONE: TakenSlot[] = [];

/** What is drawn over the bands: skeds, and slot and hand together. */
function overdrawn({ slot, cursorMs, taken = NONE }: Props): Interval[] {
  const marks = [slot?.startMs, slot?.endMs, cursorMs].filter((at) => typeof at === 'number');
  if (marks.length === 0) return taken;
  return [...taken, { startMs: Math.min(...marks), endMs: Math.max(...marks) + 1 }];
}

const Ground = memo(function Ground({
  frame,
  stations,
}: {
  frame: RasterFrame;
  stations: RasterStation[];
}) {
  const whole = [{ startMs: frame.fromMs, endMs: frame.fromMs + frame.days * 86_400_000 }];
  const half = frame.rowHeight / 2;
  const asleep = stations.map((station) =>
    station.usable ? rowPieces(frame, subtractIntervals(whole, station.usable)) : [],
  );
  if (stations.length > 2) {
    return (
      <g aria-hidden="true">
        {asleep.map((pieces, index) => (
          <path
            key={stations[index]!.callSign}
            className="ground ground--many"
            d={rectanglesPath(frame, pieces, 0, frame.rowHeight)}
          />
        ))}
      </g>
    );
  }
  return (
    <g aria-hidden="true">
      {asleep.map((pieces, index) => (
        <g key={stations[index]!.callSign}>
          <path className="ground" d={rectanglesPath(frame, pieces, index * half, half)} />
          <path className="ground__edge" d={edgesPath(frame, pieces, index * half, half)} />
        </g>
      ))}
    </g>
  );
});

const Layers = memo(function Layers({
  frame,
  prefix,
  layers,
}: {
  frame: RasterFrame;
  prefix: string;
  layers: RasterLayers;
}) {
  const hidden = rowPieces(frame, layers.hidden);
  return (
    <g aria-hidden="true">
      <path
        fill={`url(#${prefix}-hz2)`}
        d={rectanglesPath(frame, hidden, frame.rowHeight / 2 - 3, 6)}
      />
      {QUALITY_STEPS.map((step) => {
        const pieces = rowPieces(
          frame,
          layers.outside.filter((band) => band.step === step),
        );
        return pieces.length > 0 ? (
          <path key={step} className={`outside outside--${step}`} d={linesPath(frame, pieces)} />
        ) : null;
      })}
    </g>
  );
});

const Taken = memo(function Taken({ frame, taken }: { frame: RasterFrame; taken: TakenSlot[] }) {
  const height = frame.bandHeight + 4;
  const offset = (frame.rowHeight - height) / 2;
  return (
    <g aria-hidden="true">
      {(['agreed', 'offered'] as const).map((state) => {
        const pieces = rowPieces(
          frame,
          taken.filter((slot) => slot.state === state),
        );
        if (pieces.length === 0) return null;
        return (
          <path
            key={state}
            className="taken__halo"
            d={rectanglesPath(frame, pieces, offset, height)}
          />
        );
      })}
    </g>
  );
});

function Marks({ frame, taken = [], ...props }: Props & { frame: RasterFrame }) {
  const { layers, chosen, cursorMs, slot, nowMs } = props;
  const height = frame.bandHeight + 4;
  const offset = (frame.rowHeight - height) / 2;
  const chosenWindow = chosen === null || chosen === undefined ? undefined : layers.windows[chosen];
  const now = nowMs === undefined ? null : placeOf(frame, nowMs);
  const cursor = cursorMs === null || cursorMs === undefined ? null : placeOf(frame, cursorMs);
  const rectangles = (intervals: readonly Interval[], top: number, high: number) =>
    rectanglesPath(frame, rowPieces(frame, intervals), top, high);
  return (
    <g aria-hidden="true">
      {(['agreed', 'offered'] as const).map((state) => (
        <path
          key={state}
          className={`taken taken--${state}`}
          d={rectangles(
            taken.filter((item) => item.state === state),
            offset,
            height,
          )}
        />
      ))}
      {now ? (
        <path
          className="raster__now"
          d={`M${now.x} ${rowTop(frame, now.row) - 4}v${frame.rowHeight + 4}m-4 ${-frame.rowHeight - 8}h8l-4 6z`}
        />
      ) : null}
      {chosenWindow ? (
        <path className="raster__chosen" d={rectangles([chosenWindow], 0.5, frame.rowHeight - 1)} />
      ) : null}
      {slot ? (
        <path
          className="taken__halo"
          d={rectangles([slot], (frame.rowHeight - frame.bandHeight) / 2, frame.bandHeight)}
        />
      ) : null}
      {slot ? (
        <path
          className="raster__slot"
          d={rectangles([slot], (frame.rowHeight - frame.bandHeight) / 2, frame.bandHeight)}
        />
      ) : null}
      {cursor ? (
        <g>
          <path
            className="hand__halo"
            d={`M${cursor.x} ${rowTop(frame, cursor.row)}v${frame.rowHeight}`}
          />
          <path
            className="hand"
            d={`M${cursor.x} ${rowTop(frame, cursor.row)}v${frame.rowHeight}`}
          />
        </g>
      ) : null}
    </g>
  );
}
