/**
 * Chebyshev series of a three-dimensional path over equal pieces of a span.
 * Coefficients lie piece by piece, order by order, x y z together.
 */
export interface ChebyshevPath {
  readonly startMs: number;
  readonly pieceMs: number;
  readonly pieces: number;
  readonly terms: number;
  readonly coefficients: Float64Array;
}

/** Fits `sample` (called terms × pieces times, once at each Chebyshev node). */
export function fitPath(
  startMs: number,
  endMs: number,
  pieces: number,
  terms: number,
  sample: (timeMs: number) => readonly [number, number, number],
): ChebyshevPath {
  const pieceMs = (endMs - startMs) / pieces;
  const coefficients = new Float64Array(pieces * terms * 3);
  const cosines = cosineTable(terms);
  for (let piece = 0; piece < pieces; piece += 1) {
    const base = piece * terms * 3;
    for (let node = 0; node < terms; node += 1) {
      const x = cosines[terms + node]!;
      const [vx, vy, vz] = sample(startMs + (piece + (1 + x) / 2) * pieceMs);
      for (let order = 0; order < terms; order += 1) {
        const weight = cosines[order * terms + node]! * ((order === 0 ? 1 : 2) / terms);
        const at = base + order * 3;
        coefficients[at] = coefficients[at]! + weight * vx;
        coefficients[at + 1] = coefficients[at + 1]! + weight * vy;
        coefficients[at + 2] = coefficients[at + 2]! + weight * vz;
      }
    }
  }
  return { startMs, pieceMs, pieces, terms, coefficients };
}

/** cos(order · angle of node), row by order. */
function cosineTable(terms: number): Float64Array {
  const table = new Float64Array(terms * terms);
  for (let order = 0; order < terms; order += 1) {
    for (let node = 0; node < terms; node += 1) {
      table[order * terms + node] = Math.cos((Math.PI * order * (node + 0.5)) / terms);
    }
  }
  return table;
}

/** Clenshaw's sum at a time; writes x, y, z into `out` at `at`. Outside the span the end piece is extrapolated. */
export function evaluatePath(
  path: ChebyshevPath,
  timeMs: number,
  out: Float64Array,
  at: number,
): void {
  const { coefficients, terms } = path;
  const position = (timeMs - path.startMs) / path.pieceMs;
  const piece = Math.min(Math.max(Math.floor(position), 0), path.pieces - 1);
  const x = 2 * (position - piece) - 1;
  const twice = 2 * x;
  const base = piece * terms * 3;
  let x1 = 0;
  let x2 = 0;
  let y1 = 0;
  let y2 = 0;
  let z1 = 0;
  let z2 = 0;
  for (let k = base + (terms - 1) * 3; k > base; k -= 3) {
    const x0 = twice * x1 - x2 + coefficients[k]!;
    x2 = x1;
    x1 = x0;
    const y0 = twice * y1 - y2 + coefficients[k + 1]!;
    y2 = y1;
    y1 = y0;
    const z0 = twice * z1 - z2 + coefficients[k + 2]!;
    z2 = z1;
    z1 = z0;
  }
  out[at] = x * x1 - x2 + coefficients[base]!;
  out[at + 1] = x * y1 - y2 + coefficients[base + 1]!;
  out[at + 2] = x * z1 - z2 + coefficients[base + 2]!;
}
