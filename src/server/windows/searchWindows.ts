import { setImmediate } from 'node:timers/promises';
import { MINUTE_MS } from '../../domain/time/interval';
import {
  WindowCache,
  findCommonWindows,
  type CommonWindow,
  type LimitCause,
  type LimitReason,
  type WindowSearch,
  type WindowStation,
} from '../../domain/window';
import type { WindowsAnswer } from './calculatorAnswers';
import type { WindowsRequest } from './calculatorSchemas';
import { angle, bearing, instantText, rounded } from './figures';
import { roundLink, type RoundLink } from './roundLink';

type OpenReason = Exclude<LimitReason, 'usableHours'>;

/**
 * Common windows of the stations of an open request, and where the other hours went. Lets other requests have
 * their turn after each station. Throws `InvalidInput` for a setup that cannot be computed.
 */
export async function searchWindows(request: WindowsRequest): Promise<WindowsAnswer> {
  const { from, to, minimumMarginDb, refraction = false } = request;
  const span = { startMs: from, endMs: to };
  const stations: WindowStation[] = request.stations.map(({ callSign, site, sky = {} }) => ({
    callSign,
    site,
    sky,
  }));
  const cache = new WindowCache();
  const link = roundLink(request, cache.table(span));
  for (const station of stations) {
    cache.timeline(span, station, refraction);
    await setImmediate();
  }
  const search: WindowSearch = {
    ...span,
    stations,
    frequencyMhz: request.frequencyMhz,
    minimumMinutes: request.minimumMinutes,
    maximumDegradationDb: request.maximumDegradationDb,
    minimumSunSeparationDeg: request.minimumSunSeparationDeg,
    refraction,
  };
  const margin = link && minimumMarginDb !== undefined ? [link.limit(minimumMarginDb)] : [];
  const { windows, lost } = findCommonWindows(search, cache, margin);
  return {
    windows: windows.map((window) => windowAnswer(window, link)),
    lost: lost.map(({ hours, ...cause }) => ({
      ...causeAnswer(cause),
      hours: rounded(hours, 7),
    })),
  };
}

function windowAnswer(
  window: CommonWindow,
  link: RoundLink | null,
): WindowsAnswer['windows'][number] {
  const { timeMs, degradationDb } = window.best;
  return {
    start: instantText(window.startMs),
    end: instantText(window.endMs),
    minutes: rounded((window.endMs - window.startMs) / MINUTE_MS, 5),
    opens: causeAnswer(window.opens),
    closes: causeAnswer(window.closes),
    best: {
      time: instantText(timeMs),
      ...(degradationDb === undefined ? {} : { degradationDb: rounded(degradationDb, 4) }),
      ...link?.at(timeMs),
    },
    stations: window.stations.map((station) => ({
      callSign: station.callSign,
      startAzimuthDeg: bearing(station.startAzimuthDeg),
      startElevationDeg: angle(station.startElevationDeg),
      endAzimuthDeg: bearing(station.endAzimuthDeg),
      endElevationDeg: angle(station.endElevationDeg),
      maximumElevationDeg: angle(station.maximumElevationDeg),
    })),
  };
}

function causeAnswer({ callSign, reason, name }: LimitCause) {
  return {
    callSign,
    reason: reason as OpenReason,
    ...(name === undefined ? {} : { name }),
  };
}
