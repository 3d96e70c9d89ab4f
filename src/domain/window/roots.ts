/** A smooth function of time. Objects rather than closures, because searches ask millions of times. */
export interface TimeFunction {
  evaluate(timeMs: number): number;
}

/** Values of a function at equally spaced nodes, and the function itself for any instant between. */
export interface GridFunction extends TimeFunction {
  readonly gridStartMs: number;
  readonly gridStepMs: number;
  readonly values: Float64Array;
  /** Whether zeros around a node are of no interest. */
  skips?(node: number): boolean;
}

const TOLERANCE_MS = 0.5;
/** A same-sign extremum closer to zero than this is looked at; the parabola through three nodes errs by 4e-5. */
const GRAZING = 2e-4;

/**
 * Appends every zero between node `first` and node `last`, unsorted. The function must be smooth with at most
 * one extremum in two steps; `values` must also hold the nodes just outside. Simple zeros come from the cubic
 * through four nodes and one evaluation; near-tangent ones from a search of the extremum.
 */
export function gridRoots(grid: GridFunction, first: number, last: number, roots: number[]): void {
  const { values } = grid;
  for (let node = first; node < last; node += 1) {
    const here = values[node]!;
    const next = values[node + 1]!;
    if (here < 0 !== next < 0) {
      if (grid.skips?.(node) && grid.skips(node + 1)) continue;
      roots.push(simpleRoot(grid, node));
    } else if (Math.abs(here) < Math.abs(next)) {
      if (isDip(values, node)) dipRoots(grid, node, roots);
    } else if (node + 1 === last && isDip(values, last)) {
      dipRoots(grid, last, roots);
    }
  }
}

/** Whether there may be an extremum on the other side of zero than the node, or touching it, next to the node. */
export function isDip(values: Float64Array, node: number): boolean {
  const before = values[node - 1];
  const here = values[node]!;
  const after = values[node + 1];
  if (before === undefined || after === undefined) return false;
  if (here < 0 !== before < 0 || here < 0 !== after < 0) return false;
  if (Math.abs(here) > Math.abs(before) || Math.abs(here) > Math.abs(after)) return false;
  const bend = before - 2 * here + after;
  const slope = before - after;
  const extreme = here - (slope * slope) / (8 * bend);
  return extreme < 0 !== here < 0 || Math.abs(extreme) < GRAZING;
}

/** Appends both zeros around the extremum next to a node, if there are any. */
export function dipRoots(grid: GridFunction, node: number, roots: number[]): void {
  const beforeMs = grid.gridStartMs + (node - 1) * grid.gridStepMs;
  const afterMs = beforeMs + 2 * grid.gridStepMs;
  crossingsAroundTurn(grid, beforeMs, afterMs, grid.values[node]! < 0, roots);
}

/** Appends both zeros around the one extremum between the ends, if it lies on the other side of zero than they. */
export function crossingsAroundTurn(
  f: TimeFunction,
  fromMs: number,
  toMs: number,
  negative: boolean,
  roots: number[],
): void {
  const side = negative ? -1 : 1;
  const turnMs = minimumBetween(f, side, fromMs, toMs, 200, true);
  if (side * f.evaluate(turnMs) >= 0) return;
  roots.push(bracketedRoot(f, fromMs, turnMs), bracketedRoot(f, turnMs, toMs));
}

/** The zero between a node and the next, at which the signs differ. */
export function simpleRoot(grid: GridFunction, node: number): number {
  const { values, gridStartMs, gridStepMs } = grid;
  const before = values[node - 1];
  const here = values[node]!;
  const next = values[node + 1]!;
  const after = values[node + 2];
  const leftMs = gridStartMs + node * gridStepMs;
  if (before !== undefined && after !== undefined) {
    const c1 = -before / 3 - here / 2 + next - after / 6;
    const c2 = before / 2 - here + next / 2;
    const c3 = (after - before) / 6 + (here - next) / 2;
    let x = here / (here - next);
    let slope = c1;
    for (let round = 0; round < 3; round += 1) {
      slope = c1 + x * (2 * c2 + 3 * x * c3);
      x -= (here + x * (c1 + x * (c2 + x * c3))) / slope;
    }
    if (x >= 0 && x <= 1) {
      const correction = grid.evaluate(leftMs + x * gridStepMs) / slope;
      if (Math.abs(correction) < 1e-3) return leftMs + (x - correction) * gridStepMs;
    }
  }
  return bracketedRoot(grid, leftMs, leftMs + gridStepMs, here, next);
}

/**
 * Where a function of opposite signs at both ends is zero, to a millisecond. Chandrupatla's method (Advances in
 * Engineering Software 28 (1997) 145, from memory): inverse quadratic steps where they are safe, else halving.
 */
export function bracketedRoot(
  f: TimeFunction,
  fromMs: number,
  toMs: number,
  fromValue = f.evaluate(fromMs),
  toValue = f.evaluate(toMs),
): number {
  let a = toMs;
  let b = fromMs;
  let fa = toValue;
  let fb = fromValue;
  let fraction = fa === fb ? 0.5 : Math.min(Math.max(fa / (fa - fb), 0.05), 0.95);
  for (let round = 0; round < 60; round += 1) {
    const x = a + fraction * (b - a);
    const fx = f.evaluate(x);
    let c: number;
    let fc: number;
    if (fx < 0 === fa < 0) {
      c = a;
      fc = fa;
    } else {
      c = b;
      fc = fb;
      b = a;
      fb = fa;
    }
    a = x;
    fa = fx;
    const least = TOLERANCE_MS / Math.abs(b - a);
    if (least > 0.5 || fa === 0) return Math.abs(fa) < Math.abs(fb) ? a : b;
    const xi = (a - b) / (c - b);
    const phi = (fa - fb) / (fc - fb);
    fraction =
      phi * phi < xi && (1 - phi) * (1 - phi) < 1 - xi
        ? (fa / (fb - fa)) * (fc / (fb - fc)) +
          ((c - a) / (b - a)) * (fa / (fc - fa)) * (fb / (fc - fb))
        : 0.5;
    fraction = Math.min(Math.max(fraction, least), 1 - least);
  }
  return (a + b) / 2;
}

const GOLDEN = (Math.sqrt(5) - 1) / 2;

/**
 * Where `side` · f, having one minimum between the ends, is least, by golden section; `untilNegative` stops at the
 * first value below zero.
 */
export function minimumBetween(
  f: TimeFunction,
  side: 1 | -1,
  fromMs: number,
  toMs: number,
  toleranceMs: number,
  untilNegative = false,
): number {
  let a = fromMs;
  let b = toMs;
  let c = b - GOLDEN * (b - a);
  let d = a + GOLDEN * (b - a);
  let fc = side * f.evaluate(c);
  let fd = side * f.evaluate(d);
  while (b - a > toleranceMs) {
    if (untilNegative && (fc < 0 || fd < 0)) break;
    if (fc < fd) {
      b = d;
      d = c;
      fd = fc;
      c = b - GOLDEN * (b - a);
      fc = side * f.evaluate(c);
    } else {
      a = c;
      c = d;
      fc = fd;
      d = a + GOLDEN * (b - a);
      fd = side * f.evaluate(d);
    }
  }
  return fc < fd ? c : d;
}
