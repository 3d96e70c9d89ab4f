import type { StationTrack } from '../ephemeris/track';
import { skyCode, type CompiledSky } from '../sky/compile';
import { BoundaryGrid } from './boundaryGrid';
import { ProfileSearch } from './profileSearch';
import { TimelineBuilder, type Timeline } from './timeline';

/** Between two nodes of 20 minutes the sine of elevation rises at most 0.00095 above both. */
const BULGE = 0.002;

/** First and last grid node of a stretch in which the Moon may stand above the station's floor. */
interface Run {
  first: number;
  last: number;
  /** Greatest sine of elevation at its nodes. */
  top: number;
}

/**
 * What the sky of one station allows over the table's span. Every crossing of every limit is solved; between two
 * crossings next to each other nothing can change, so one question at the middle settles the whole stretch.
 *
 * @param grid of this track, to be used again when the track is moved to the next station.
 */
export function stationTimeline(
  track: StationTrack,
  sky: CompiledSky,
  callSign: string,
  grid = new BoundaryGrid(track),
): Timeline {
  const { table } = track;
  const builder = new TimelineBuilder();
  builder.begin(table.startMs, sky.floorCode);
  const direction = new Float64Array(3);
  const profile = sky.profile ? new ProfileSearch(track, sky, sky.profile) : null;
  for (const run of runsAboveFloor(track, sky)) {
    const edges: number[] = [];
    for (const boundary of sky.boundaries) {
      if (boundary.up !== 0 && boundary.level > run.top + BULGE) continue;
      grid.crossings(boundary, run.first, run.last, edges);
    }
    profile?.crossings(run.first, run.last, edges);
    classify(track, sky, run, edges, direction, builder);
  }
  const causes = sky.causes.map((cause) => (cause ? { callSign, ...cause } : null));
  return builder.finish(table, causes);
}

function runsAboveFloor(track: StationTrack, sky: CompiledSky): Run[] {
  const { up } = track;
  const threshold = sky.floorSin - BULGE;
  const runs: Run[] = [];
  const lastInside = up.length - 2;
  let first = -1;
  let top = -1;
  for (let node = 0; node < up.length; node += 1) {
    const sine = up[node]!;
    if (sine > threshold) {
      if (first < 0) first = node;
      if (sine > top) top = sine;
    } else if (first >= 0) {
      runs.push({ first: Math.max(first - 1, 1), last: Math.min(node, lastInside), top });
      first = -1;
      top = -1;
    }
  }
  if (first >= 0) runs.push({ first: Math.max(first - 1, 1), last: lastInside, top });
  return runs.filter((run) => run.last > run.first);
}

function classify(
  track: StationTrack,
  sky: CompiledSky,
  run: Run,
  edges: number[],
  direction: Float64Array,
  builder: TimelineBuilder,
): void {
  const endMs = track.nodeMs(run.last);
  edges.push(endMs);
  edges.sort((a, b) => a - b);
  let fromMs = track.nodeMs(run.first);
  for (const edgeMs of edges) {
    if (edgeMs - fromMs < 1e-3) continue;
    builder.begin(fromMs, codeBetween(track, sky, fromMs, edgeMs, direction));
    fromMs = edgeMs;
  }
  if (run.last < track.up.length - 2) builder.begin(endMs, sky.floorCode);
}

/** What holds in the middle of a stretch, or, where one lies well inside, at the node nearest to it. */
function codeBetween(
  track: StationTrack,
  sky: CompiledSky,
  fromMs: number,
  toMs: number,
  direction: Float64Array,
): number {
  const { gridStartMs, gridStepMs } = track.table;
  const middleMs = (fromMs + toMs) / 2;
  if (toMs - fromMs > 2 * gridStepMs) {
    const node = Math.round((middleMs - gridStartMs) / gridStepMs);
    return skyCode(sky, track.east[node]!, track.north[node]!, track.up[node]!);
  }
  track.direction(middleMs, direction);
  return skyCode(sky, direction[0]!, direction[1]!, direction[2]!);
}
