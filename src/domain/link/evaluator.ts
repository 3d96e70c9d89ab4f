import { buildMoonTable, type MoonTable } from '../ephemeris/table';
import { HOUR_MS, type Interval } from '../time/interval';
import { linkModel, type LinkModel, type LinkOptions } from './model';
import { LinkMoment } from './moment';
import type { LinkStation } from './setup';

/** Margins and chance at even steps; NaN (chance 0) wherever the Moon is not above both horizons. */
export interface LinkSeries {
  readonly startMs: number;
  readonly stepMs: number;
  /** First to second station, dB. */
  readonly marginThereDb: Float64Array;
  /** Second to first station, dB. */
  readonly marginBackDb: Float64Array;
  /** Of the whole contact in a slot that begins there. */
  readonly contactChance: Float64Array;
}

/**
 * A pair's link at many instants. Make it once for a pair, frequency and mode; it keeps no time.
 * Throws LinkInputError for input that cannot be computed.
 */
export function createLinkEvaluator(
  stations: readonly [LinkStation, LinkStation],
  frequencyMhz: number,
  mode: string,
  options: LinkOptions = {},
): LinkEvaluator {
  return new LinkEvaluator(linkModel(stations, frequencyMhz, mode, options));
}

/** The Moon rises by less than this anywhere: the Earth turns 15.04° an hour, parallax adds up to 2 %. */
const FASTEST_RISE_DEG_PER_MS = 15.5 / HOUR_MS;

/** How far the Moon stands below the horizon of the station where it is lower; it cannot rise for so long. */
function belowHorizonDeg(moment: LinkMoment): number {
  return -Math.min(moment.elevationDeg(0), moment.elevationDeg(1));
}

export class LinkEvaluator {
  constructor(readonly model: LinkModel) {}

  /** For single instants within a table: call `compute(timeMs)` and read the fields. */
  over(table: MoonTable): LinkMoment {
    return new LinkMoment(this.model, table);
  }

  /**
   * The link from the start of the span to its end, both included where the step fits. Give the table when there is
   * one for the span already.
   */
  series(span: Interval, stepMs: number, table: MoonTable = buildMoonTable(span)): LinkSeries {
    const steps = Math.floor((span.endMs - span.startMs) / stepMs) + 1;
    const series: LinkSeries = {
      startMs: span.startMs,
      stepMs,
      marginThereDb: new Float64Array(steps).fill(NaN),
      marginBackDb: new Float64Array(steps).fill(NaN),
      contactChance: new Float64Array(steps),
    };
    const moment = this.over(table);
    for (let step = 0; step < steps; step += 1) {
      const timeMs = span.startMs + step * stepMs;
      if (!moment.look(timeMs)) {
        step += Math.floor(belowHorizonDeg(moment) / (FASTEST_RISE_DEG_PER_MS * stepMs));
        continue;
      }
      moment.compute(timeMs);
      series.marginThereDb[step] = moment.directions[0].marginDb;
      series.marginBackDb[step] = moment.directions[1].marginDb;
      series.contactChance[step] = moment.contactChance;
    }
    return series;
  }
}
