import { antennaFigures } from '../link/antenna';
import { GENERAL_AVERAGING_MIN, OCCUPATIONAL_AVERAGING_MIN } from '../link/exposure';
import { exposureEstimate, type ExposureLevel } from '../link/exposureEstimate';
import { GROUND_BELOW_MHZ, GROUND_FACTOR } from '../link/exposureWords';
import type { LinkSetup } from '../link/setup';
import { largestDuty, type TrPlan } from './periods';

export interface SheetExposure {
  levels: (ExposureLevel & { duty: number })[];
  /** Whether a reflection from the ground is counted. */
  ground: boolean;
}

/**
 * The exposure estimate with the duty of the T/R plan: the largest share of each level's averaging time that the
 * station transmits, its carrier taken as steady in its periods. Null without power.
 */
export function sheetExposure(
  setup: LinkSetup,
  frequencyMhz: number,
  plan: TrPlan,
): SheetExposure | null {
  if (!(setup.powerAtFeedW > 0)) return null;
  const ground = frequencyMhz < GROUND_BELOW_MHZ;
  const { antenna } = setup;
  const levelsWith = (averagedOverMin: number) => {
    const duty = largestDuty(plan, averagedOverMin);
    const { levels } = exposureEstimate({
      frequencyMhz,
      powerW: setup.powerAtFeedW,
      gainDbi: antennaFigures(antenna, frequencyMhz).gainDbi,
      ...(antenna.kind === 'dish' ? { diameterM: antenna.diameterM } : {}),
      duty,
      groundFactor: ground ? GROUND_FACTOR : 1,
    });
    return levels
      .filter((level) => level.averagedOverMin === averagedOverMin)
      .map((level) => ({ ...level, duty }));
  };
  return {
    ground,
    levels: [OCCUPATIONAL_AVERAGING_MIN, GENERAL_AVERAGING_MIN].flatMap(levelsWith),
  };
}
