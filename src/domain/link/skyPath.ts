import type { MoonTable } from '../ephemeris/table';
import { eclipticJ2000 } from './ecliptic';
import { skyTemperatureK, type SkyBeam } from './skyNoise';

const NODE_MS = 20 * 60_000;

/**
 * Sky temperature along the Moon's path through one beam: computed at nodes 20 minutes apart when first needed and
 * interpolated by cubics between, within 0.2 % (the Moon moves 0.2° between nodes, less than any beam's detail).
 */
export class SkyAlongPath {
  readonly #nodes: Float64Array;
  readonly #scratch = new Float64Array(3);

  constructor(
    readonly table: MoonTable,
    readonly beam: SkyBeam,
  ) {
    this.#nodes = new Float64Array(Math.ceil((table.endMs - table.startMs) / NODE_MS) + 4).fill(
      NaN,
    );
  }

  /** K; the instant must lie within the table's span. */
  at(timeMs: number): number {
    const position = (timeMs - this.table.startMs) / NODE_MS;
    const k = Math.floor(position);
    const x = position - k;
    const a = this.#node(k);
    const b = this.#node(k + 1);
    const c = this.#node(k + 2);
    const d = this.#node(k + 3);
    const outer = (d - a) / 6 - (c - b) / 2;
    return b + x * (c - a / 3 - b / 2 - d / 6 + x * ((a + c) / 2 - b + x * outer));
  }

  /** Node 0 lies one step before the span. */
  #node(index: number): number {
    const known = this.#nodes[index]!;
    if (known === known) return known;
    const timeMs = this.table.startMs + (index - 1) * NODE_MS;
    this.table.moonNearlyOfDate(timeMs, this.#scratch);
    const { longitudeDeg, latitudeDeg } = eclipticJ2000(this.#scratch, timeMs);
    const skyK = skyTemperatureK(this.beam, longitudeDeg, latitudeDeg);
    this.#nodes[index] = skyK;
    return skyK;
  }
}

/** The Moon's path stays within this ecliptic latitude. */
const PATH_LATITUDE_DEG = 5.25;

/** Coldest sky on the Moon's path through a beam, K; searched every 3° of longitude. */
export function coldestOnPathK(beam: SkyBeam): number {
  let coldestK = Infinity;
  for (let longitude = 0; longitude < 360; longitude += 3) {
    for (let side = -1; side <= 1; side += 1) {
      coldestK = Math.min(coldestK, skyTemperatureK(beam, longitude, side * PATH_LATITUDE_DEG));
    }
  }
  return coldestK;
}
