import { type Board } from './board';
import type { PlanGrid } from './grid';
import { Numbers } from './numbers';

export interface SearchSettings {
  seed: number;
  /** Temperatures in units of the objective, from first to last. */
  fromUnits: number;
  toUnits: number;
  moves: number;
  /** Asked now and then; true ends the search. */
  stop?: () => boolean;
}

const ASK_EVERY = 4096;

/**
 * Simulated annealing with ejections: an option is put down for a wish, what stands against it is taken up, and each of
 * those looks for the best place that is still free; a worse plan is accepted the more rarely the worse and the later.
 * Deterministic for a seed and a number of moves. Leaves the board on the best plan that was seen.
 */
export function anneal(board: Board, settings: SearchSettings, only?: Int32Array): void {
  const { grid } = board;
  const numbers = new Numbers(settings.seed);
  const options = only ?? freeOptions(grid);
  if (options.length === 0) return;
  const best = board.chosen.slice();
  let bestValue = board.value;
  const ejected = new Int32Array(64);
  const placed = new Int32Array(64);
  const before = new Int32Array(64);
  const cooling = Math.log(settings.toUnits / settings.fromUnits);
  let temperature = settings.fromUnits;
  for (let move = 0; move < settings.moves; move += 1) {
    if (move % ASK_EVERY === 0) {
      if (settings.stop?.()) break;
      temperature = settings.fromUnits * Math.exp((cooling * move) / settings.moves);
    }
    const option = options[numbers.below(options.length)]!;
    const wish = grid.optionWish[option]!;
    const own = board.chosen[wish]!;
    if (own === option) continue;
    const valueBefore = board.value;
    if (own >= 0) board.remove(wish);
    const count = eject(board, option, ejected);
    if (count < 0) {
      if (own >= 0) board.place(own);
      continue;
    }
    for (let at = 0; at < count; at += 1) {
      before[at] = board.chosen[ejected[at]!]!;
      board.remove(ejected[at]!);
    }
    let undo = !board.fits(option);
    let resettled = 0;
    if (!undo) {
      board.place(option);
      for (let at = 0; at < count; at += 1) {
        const place = bestFree(board, ejected[at]!);
        if (place < 0) continue;
        board.place(place);
        placed[resettled] = ejected[at]!;
        resettled += 1;
      }
      const gain = board.value - valueBefore;
      undo = gain < 0 && numbers.share() >= Math.exp(gain / temperature);
      if (undo) {
        for (let at = 0; at < resettled; at += 1) board.remove(placed[at]!);
        board.remove(wish);
      }
    }
    if (undo) {
      for (let at = 0; at < count; at += 1) board.place(before[at]!);
      if (own >= 0) board.place(own);
    } else if (board.value > bestValue) {
      bestValue = board.value;
      best.set(board.chosen);
    }
  }
  board.load(best);
}

export function freeOptions(grid: PlanGrid): Int32Array {
  return Int32Array.from(grid.optionWish, (_, option) => option).filter(
    (option) => grid.pinned[grid.optionWish[option]!]! < 0,
  );
}

/** The wishes that must go for the option, each once; −1 where a pinned one would have to. */
function eject(board: Board, option: number, out: Int32Array): number {
  const { grid } = board;
  const wish = grid.optionWish[option]!;
  let count = board.against(grid.wishA[wish]!, option, out, 0);
  const first = count;
  count = board.against(grid.wishB[wish]!, option, out, count);
  // The same wish can stand against it at both stations.
  for (let at = first; at < count; at += 1) {
    for (let other = 0; other < first; other += 1) {
      if (out[at] !== out[other]) continue;
      count -= 1;
      out[at] = out[count]!;
      at -= 1;
      break;
    }
  }
  for (let at = 0; at < count; at += 1) if (grid.pinned[out[at]!]! >= 0) return -1;
  return count;
}

/** The option of greatest value that fits for a wish that is not placed, or −1. */
export function bestFree(board: Board, wish: number): number {
  const { grid } = board;
  let best = -1;
  let bestValue = 0;
  for (let option = grid.firsts[wish]!; option < grid.firsts[wish + 1]!; option += 1) {
    const value = grid.optionValue[option]!;
    if (value > bestValue && board.fits(option)) {
      bestValue = value;
      best = option;
    }
  }
  return best;
}
