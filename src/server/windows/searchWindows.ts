import { MINUTE_MS } from '../../domain/time/interval';
import {
  findCommonWindows,
  type CommonWindow,
  type LimitCause,
  type LimitReason,
} from '../../domain/window';
import type { WindowsAnswer } from './calculatorAnswers';
import type { WindowsRequest } from './calculatorSchemas';
import { angle, bearing, instantText, rounded } from './figures';

type OpenReason = Exclude<LimitReason, 'usableHours'>;

/** Common windows of the stations of an open request, and where the other hours went. */
export function searchWindows(request: WindowsRequest): WindowsAnswer {
  const { stations, from, to, ...limits } = request;
  const { windows, lost } = findCommonWindows({
    startMs: from,
    endMs: to,
    stations: stations.map(({ callSign, site, sky = {} }) => ({ callSign, site, sky })),
    frequencyMhz: limits.frequencyMhz,
    minimumMinutes: limits.minimumMinutes,
    maximumDegradationDb: limits.maximumDegradationDb,
    minimumSunSeparationDeg: limits.minimumSunSeparationDeg,
    refraction: limits.refraction,
  });
  return {
    windows: windows.map(windowAnswer),
    lost: lost.map(({ hours, ...cause }) => ({
      ...causeAnswer(cause),
      hours: rounded(hours, 7),
    })),
  };
}

function windowAnswer(window: CommonWindow): WindowsAnswer['windows'][number] {
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
