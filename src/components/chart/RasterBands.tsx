import { memo } from 'react';
import { formatNumber } from '../../domain/time/format';
import { overlaps, type Interval } from '../../domain/time/interval';
import { QUALITY_STEPS } from '../../domain/window/quality';
import { bandNumber, rectanglesPath, rowPieces, rowTop, type RasterFrame } from './rasterGeometry';
import type { RasterLayers } from './rasterView';

/** The common windows: one path for each step, an outline for each window, and its figure where there is room. */
export const RasterBands = memo(function RasterBands({
  frame,
  layers,
  keepClear,
}: {
  frame: RasterFrame;
  layers: RasterLayers;
  /** What is drawn over the bands: figures move off it. */
  keepClear: Interval[];
}) {
  const offset = (frame.rowHeight - frame.bandHeight) / 2;
  // Below the threshold a window has the dotted outline of its bands alone.
  const edged = layers.windows.filter((_, index) => layers.windowQuality[index]!.step !== 'below');
  const everything = rowPieces(frame, [...layers.windows, ...layers.outside, ...layers.hidden]);
  return (
    <g aria-hidden="true">
      {QUALITY_STEPS.map((step) => {
        const pieces = rowPieces(
          frame,
          layers.bands.filter((band) => band.step === step),
        );
        return pieces.length > 0 ? (
          <path
            key={step}
            className={`band band--${step}`}
            d={rectanglesPath(frame, pieces, offset, frame.bandHeight)}
          />
        ) : null;
      })}
      <path
        className="band__edge"
        d={rectanglesPath(frame, rowPieces(frame, edged), offset, frame.bandHeight)}
      />
      {layers.windows.map((window, index) => {
        const quality = layers.windowQuality[index]!;
        const spot = bandNumber(
          frame,
          rowPieces(frame, [window]),
          window.best.timeMs,
          everything,
          keepClear.filter((item) => overlaps(item, window)),
        );
        if (!spot) return null;
        return (
          <text
            key={window.startMs}
            className={
              spot.place === 'inside' ? `band__number on--${quality.step}` : 'band__number'
            }
            x={spot.x}
            y={rowTop(frame, spot.row) + frame.rowHeight / 2 + 4.5}
            textAnchor="middle"
          >
            {formatNumber(quality.db, 1)}
          </text>
        );
      })}
    </g>
  );
});
