import { DAY_MS, HOUR_MS, type Interval } from '../../domain/time/interval';

/** Where everything of a month raster lies, in pixels. Row 0 is the first day. */
export interface RasterFrame {
  fromMs: number;
  days: number;
  width: number;
  height: number;
  /** Left and right edge of the 24 hours. */
  left: number;
  right: number;
  /** Top of the first row. */
  top: number;
  rowHeight: number;
  bandHeight: number;
  hourWidth: number;
}

const AXIS_HEIGHT = 17;
const LEFT_COLUMNS = 100;
const RIGHT_COLUMNS = 108;
const LONG_FROM_DAYS = 36;

/** Lays out a raster of whole UTC days. Over five weeks the rows are lower, so that two months stay in view. */
export function rasterFrame(
  fromMs: number,
  days: number,
  width: number,
  axes: number,
): RasterFrame {
  const rowHeight = days >= LONG_FROM_DAYS ? 17 : 22;
  const left = LEFT_COLUMNS;
  const right = width - RIGHT_COLUMNS;
  const top = axes * AXIS_HEIGHT + 8;
  return {
    fromMs,
    days,
    width,
    height: top + days * rowHeight + 2,
    left,
    right,
    top,
    rowHeight,
    bandHeight: rowHeight > 20 ? 13 : 11,
    hourWidth: (right - left) / 24,
  };
}

export interface RowPiece {
  row: number;
  startMs: number;
  endMs: number;
  x: number;
  width: number;
}

/** Cuts intervals at the midnights of the raster; what lies outside its days is dropped. */
export function rowPieces(frame: RasterFrame, intervals: readonly Interval[]): RowPiece[] {
  const pieces: RowPiece[] = [];
  const endOfAllMs = frame.fromMs + frame.days * DAY_MS;
  for (const interval of intervals) {
    let startMs = Math.max(interval.startMs, frame.fromMs);
    const endMs = Math.min(interval.endMs, endOfAllMs);
    while (startMs < endMs) {
      const row = Math.floor((startMs - frame.fromMs) / DAY_MS);
      const pieceEndMs = Math.min(endMs, frame.fromMs + (row + 1) * DAY_MS);
      const x = xInRow(frame, row, startMs);
      pieces.push({
        row,
        startMs,
        endMs: pieceEndMs,
        x,
        width: xInRow(frame, row, pieceEndMs) - x,
      });
      startMs = pieceEndMs;
    }
  }
  return pieces;
}

function xInRow(frame: RasterFrame, row: number, atMs: number): number {
  return frame.left + ((atMs - frame.fromMs - row * DAY_MS) / HOUR_MS) * frame.hourWidth;
}

/** Place of an instant: its row and its x. Null outside the raster's days. */
export function placeOf(frame: RasterFrame, atMs: number): { row: number; x: number } | null {
  const row = Math.floor((atMs - frame.fromMs) / DAY_MS);
  if (row < 0 || row >= frame.days) return null;
  return { row, x: xInRow(frame, row, atMs) };
}

/** The instant under a point, or null beside the hours. */
export function instantAt(frame: RasterFrame, x: number, y: number): number | null {
  const row = Math.floor((y - frame.top) / frame.rowHeight);
  if (row < 0 || row >= frame.days || x < frame.left || x > frame.right) return null;
  return frame.fromMs + row * DAY_MS + ((x - frame.left) / frame.hourWidth) * HOUR_MS;
}

export function rowTop(frame: RasterFrame, row: number): number {
  return frame.top + row * frame.rowHeight;
}

/** One path of rectangles, `height` high, `offset` below the top of their rows. */
export function rectanglesPath(
  frame: RasterFrame,
  pieces: readonly RowPiece[],
  offset: number,
  height: number,
): string {
  let path = '';
  for (const piece of pieces) {
    path += `M${round(piece.x)} ${rowTop(frame, piece.row) + offset}h${round(piece.width)}v${height}h${round(-piece.width)}z`;
  }
  return path;
}

/** One path of strokes along the middle of their rows. */
export function linesPath(frame: RasterFrame, pieces: readonly RowPiece[]): string {
  let path = '';
  for (const piece of pieces) {
    const y = rowTop(frame, piece.row) + frame.rowHeight / 2;
    path += `M${round(piece.x)} ${y}h${round(Math.max(piece.width, 1))}`;
  }
  return path;
}

/** Upright hairlines where hours begin or end, in one half of their rows or the whole of them. */
export function edgesPath(
  frame: RasterFrame,
  pieces: readonly RowPiece[],
  offset: number,
  height: number,
): string {
  let path = '';
  for (const piece of pieces) {
    const y = rowTop(frame, piece.row) + offset;
    if (piece.x > frame.left + 0.5) path += `M${round(piece.x)} ${y}v${height}`;
    const end = piece.x + piece.width;
    if (end < frame.right - 0.5) path += `M${round(end)} ${y}v${height}`;
  }
  return path;
}

export interface BandNumber {
  x: number;
  row: number;
  /** `inside` the band in the colour that suits its fill, or `beside` it in ink. */
  place: 'inside' | 'beside';
}

const NUMBER_WIDTH = 30;

/**
 * Where the figure of a window goes: inside at the best moment where the band has room, else beside it where
 * the row is free, else nowhere (the right column still says it).
 */
export function bandNumber(
  frame: RasterFrame,
  pieces: readonly RowPiece[],
  bestMs: number,
  all: readonly RowPiece[],
  keepClear: readonly Interval[] = [],
): BandNumber | null {
  const own = pieces.find((piece) => bestMs >= piece.startMs && bestMs <= piece.endMs) ?? pieces[0];
  if (!own) return null;
  if (own.width >= NUMBER_WIDTH + 4) {
    const wanted = xInRow(frame, own.row, bestMs);
    const least = own.x + NUMBER_WIDTH / 2 + 2;
    const most = own.x + own.width - NUMBER_WIDTH / 2 - 2;
    const x = Math.min(Math.max(wanted, least), most);
    return clearOf(frame, own.row, x, least, most, keepClear);
  }
  const end = own.x + own.width;
  const free = (from: number, to: number) =>
    from >= frame.left &&
    to <= frame.right &&
    all.every((piece) => piece.row !== own.row || piece.x >= to || piece.x + piece.width <= from);
  if (free(end + 1, end + 4 + NUMBER_WIDTH)) {
    return { x: end + 3 + NUMBER_WIDTH / 2, row: own.row, place: 'beside' };
  }
  if (free(own.x - 4 - NUMBER_WIDTH, own.x - 1)) {
    return { x: own.x - 3 - NUMBER_WIDTH / 2, row: own.row, place: 'beside' };
  }
  return null;
}

/** Moves a figure inside its band off what is drawn over it; null where no room is left. */
function clearOf(
  frame: RasterFrame,
  row: number,
  x: number,
  least: number,
  most: number,
  keepClear: readonly Interval[],
): BandNumber | null {
  const blocks = keepClear.map((item) => ({
    from: xInRow(frame, row, item.startMs) - NUMBER_WIDTH / 2 - 3,
    to: xInRow(frame, row, item.endMs) + NUMBER_WIDTH / 2 + 3,
  }));
  const free = (at: number) =>
    at >= least && at <= most && blocks.every(({ from, to }) => at <= from || at >= to);
  const spots = [x, ...blocks.flatMap(({ from, to }) => [from, to])].filter(free);
  if (spots.length === 0) return null;
  const nearest = spots.reduce((a, b) => (Math.abs(b - x) < Math.abs(a - x) ? b : a));
  return { x: nearest, row, place: 'inside' };
}

export function round(value: number): number {
  return Math.round(value * 10) / 10;
}
