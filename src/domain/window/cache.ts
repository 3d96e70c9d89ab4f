import { buildMoonTable, type MoonTable } from '../ephemeris/table';
import { StationTrack } from '../ephemeris/track';
import type { Site } from '../sky/limits';
import { compileSky } from '../sky/compile';
import type { Interval } from '../time/interval';
import { stationTimeline } from './stationTimeline';
import type { Timeline } from './timeline';
import type { WindowStation } from './types';

const KEPT_TABLES = 4;
const KEPT_TRACKS = 128;
const KEPT_TIMELINES = 256;

/** Map that forgets what was asked longest ago. */
class Recent<V> {
  readonly #map = new Map<string, V>();

  constructor(readonly kept: number) {}

  get(key: string, make: () => V): V {
    const known = this.#map.get(key);
    if (known !== undefined) {
      this.#map.delete(key);
      this.#map.set(key, known);
      return known;
    }
    const made = make();
    this.#map.set(key, made);
    if (this.#map.size > this.kept) this.#map.delete(this.#map.keys().next().value!);
    return made;
  }
}

/**
 * Keeps Moon tables, tracks and station timelines between searches, so that changing one limit of one station
 * computes only that station anew. Give the same cache to every search of one page or one server.
 */
export class WindowCache {
  readonly #tables = new Recent<MoonTable>(KEPT_TABLES);
  readonly #tracks = new Recent<StationTrack>(KEPT_TRACKS);
  readonly #timelines = new Recent<Timeline>(KEPT_TIMELINES);

  table(span: Interval): MoonTable {
    return this.#tables.get(spanKey(span), () => buildMoonTable(span));
  }

  track(span: Interval, site: Site): StationTrack {
    const key = `${spanKey(span)} ${siteKey(site)}`;
    return this.#tracks.get(key, () => new StationTrack(this.table(span), site));
  }

  timeline(span: Interval, station: WindowStation, refraction: boolean): Timeline {
    const { callSign, site, sky } = station;
    const key = `${spanKey(span)} ${siteKey(site)} ${refraction} ${callSign} ${JSON.stringify(sky)}`;
    return this.#timelines.get(key, () =>
      stationTimeline(this.track(span, site), compileSky(sky, refraction), callSign),
    );
  }
}

function spanKey(span: Interval): string {
  return `${span.startMs}/${span.endMs}`;
}

function siteKey(site: Site): string {
  return `${site.latitudeDeg},${site.longitudeDeg},${site.heightM}`;
}
