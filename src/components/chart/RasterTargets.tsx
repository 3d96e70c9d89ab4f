import { memo, type KeyboardEvent, type MouseEvent } from 'react';
import { formatUtcRange } from '../../domain/time/format';
import { QUALITY_NAMES, qualityWords } from '../../domain/window/quality';
import { instantAt, rectanglesPath, rowPieces, type RasterFrame } from './rasterGeometry';
import type { RasterLayers } from './rasterView';

/** Every window as a button; one of them can be reached by Tab, arrows walk on from it. */
export const RasterTargets = memo(function RasterTargets({
  frame,
  layers,
  chosen,
  onChoose,
}: {
  frame: RasterFrame;
  layers: RasterLayers;
  chosen: number | null;
  onChoose: (index: number, atMs: number | null) => void;
}) {
  const press = (event: MouseEvent<SVGPathElement>, index: number) => {
    const svg = event.currentTarget.ownerSVGElement!;
    const box = svg.getBoundingClientRect();
    const scale = frame.width / box.width;
    onChoose(
      index,
      instantAt(frame, (event.clientX - box.left) * scale, (event.clientY - box.top) * scale),
    );
  };
  const walk = (event: KeyboardEvent<SVGPathElement>, index: number) => {
    const last = layers.windows.length - 1;
    const next = {
      ArrowRight: index + 1,
      ArrowDown: index + 1,
      ArrowLeft: index - 1,
      ArrowUp: index - 1,
      Home: 0,
      End: last,
    }[event.key];
    if (event.key === 'Enter' || event.key === ' ') {
      event.preventDefault();
      onChoose(index, null);
      return;
    }
    if (next === undefined) return;
    event.preventDefault();
    const to = Math.min(Math.max(next, 0), last);
    onChoose(to, null);
    const targets = event.currentTarget.parentElement!.querySelectorAll<SVGPathElement>('.target');
    targets[to]?.focus();
  };
  return (
    <g>
      {layers.windows.map((window, index) => {
        const pieces = rowPieces(frame, [window]).map((piece) =>
          piece.width < 12 ? { ...piece, x: piece.x - 4, width: piece.width + 8 } : piece,
        );
        const quality = layers.windowQuality[index]!;
        return (
          <path
            key={window.startMs}
            className="target"
            role="button"
            tabIndex={index === (chosen ?? 0) ? 0 : -1}
            aria-pressed={index === chosen}
            aria-label={`${formatUtcRange(window)}, best ${QUALITY_NAMES[quality.basis].toLowerCase()} ${qualityWords(quality)}`}
            d={rectanglesPath(frame, pieces, 0, frame.rowHeight)}
            onClick={(event) => press(event, index)}
            onKeyDown={(event) => walk(event, index)}
          />
        );
      })}
    </g>
  );
});
