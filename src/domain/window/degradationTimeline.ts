import type { MoonTable } from '../ephemeris/table';
import { skyAndDegradation, type DegradationModel } from '../link/degradation';
import { HOUR_MS } from '../time/interval';
import { gridRoots, type GridFunction, type TimeFunction } from './roots';
import { timelineOfSign, type Timeline } from './timeline';

/** Degradation in dB over a table's span: hourly nodes (the Moon moves half a degree) and any instant between. */
export class DegradationTrack implements TimeFunction {
  readonly gridStartMs: number;
  readonly gridStepMs: number;
  readonly values: Float64Array;
  readonly #ofDate = new Float64Array(3);

  constructor(
    readonly table: MoonTable,
    readonly model: DegradationModel,
  ) {
    const steps = Math.ceil((table.endMs - table.startMs) / HOUR_MS);
    this.gridStepMs = (table.endMs - table.startMs) / steps;
    this.gridStartMs = table.startMs;
    this.values = new Float64Array(steps + 1);
    for (let node = 0; node <= steps; node += 1) {
      this.values[node] = this.evaluate(this.gridStartMs + node * this.gridStepMs);
    }
  }

  evaluate(timeMs: number): number {
    this.table.moonNearlyOfDate(timeMs, this.#ofDate);
    return skyAndDegradation(this.model, timeMs, this.#ofDate).degradationDb;
  }
}

/** Free while the degradation is at most the given one. */
export function degradationTimeline(track: DegradationTrack, maximumDb: number): Timeline {
  const room: GridFunction = {
    gridStartMs: track.gridStartMs,
    gridStepMs: track.gridStepMs,
    values: track.values.map((value) => maximumDb - value),
    evaluate: (timeMs) => maximumDb - track.evaluate(timeMs),
  };
  const edges: number[] = [];
  gridRoots(room, 0, room.values.length - 1, edges);
  return timelineOfSign(track.table, room, edges, { callSign: null, reason: 'degradation' });
}
