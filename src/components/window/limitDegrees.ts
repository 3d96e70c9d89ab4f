import type { WindowQuestion } from '../../domain/window/question';
import type { ChosenStation } from '../../domain/window/searchData';
import type { LimitDegrees } from '../../domain/window/sentences';

/** Degrees behind the stations' limits, for sentences such as "ends at QA1LUN’s 8° limit". */
export function limitDegrees(
  question: WindowQuestion,
  stations: readonly ChosenStation[],
): LimitDegrees {
  return (callSign, reason) => {
    const index = stations.findIndex((station) => station.callSign === callSign);
    const station = stations[index];
    if (!station) return null;
    if (reason === 'elevationLimit') {
      return question.lowestDeg[index] ?? station.sky.elevationFromDeg ?? null;
    }
    return reason === 'transmitElevation' ? (station.sky.transmitElevationFromDeg ?? null) : null;
  };
}
