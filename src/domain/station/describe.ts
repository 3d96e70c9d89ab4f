import { antennaFigures } from '../link/antenna';
import { chainTemperatureK } from '../link/receiveChain';
import type { SkyLimits } from '../sky/limits';
import { formatAngle, formatNumber } from '../time/format';
import { bandById, type BandId } from './bands';
import type { BandSetup, Polarization } from './setup';

const POLARIZATIONS: Record<Polarization, string> = {
  horizontal: 'horizontal',
  vertical: 'vertical',
  rightCircular: 'right circular',
  leftCircular: 'left circular',
  rotatable: 'rotatable',
};

export interface EquipmentWords {
  antenna: string;
  gain: string;
  polarization: string;
  power: string;
  receiver: string;
}

/** Equipment of one band in the words and figures of a table. */
export function describeEquipment(band: BandId, setup: BandSetup): EquipmentWords {
  const { antenna, receive } = setup;
  const { gainDbi } = antennaFigures(antenna, bandById(band).centreMhz);
  return {
    antenna: antenna.kind === 'dish' ? `${formatNumber(antenna.diameterM, 1)} m dish` : 'array',
    gain: formatNumber(gainDbi, 1),
    polarization: POLARIZATIONS[setup.polarization],
    power: formatNumber(setup.powerAtFeedW, setup.powerAtFeedW < 10 ? 1 : 0),
    receiver:
      receive.kind === 'measured'
        ? `${formatNumber(receive.systemTemperatureK)} K system`
        : `${formatNumber(chainTemperatureK(receive.stages))} K receiver`,
  };
}

/** What the dish can see, a sentence a limit. */
export function describeSky(sky: SkyLimits): string[] {
  const sentences: string[] = [];
  const { elevationFromDeg, elevationToDeg, azimuthFromDeg, azimuthToDeg } = sky;
  if (elevationFromDeg !== undefined || elevationToDeg !== undefined) {
    sentences.push(
      `Elevation ${formatAngle(elevationFromDeg ?? 0)} to ${formatAngle(elevationToDeg ?? 90)}.`,
    );
  }
  if (azimuthFromDeg !== undefined && azimuthToDeg !== undefined) {
    sentences.push(
      `Azimuth ${formatAngle(azimuthFromDeg)} clockwise to ${formatAngle(azimuthToDeg)}.`,
    );
  }
  if (sky.transmitElevationFromDeg !== undefined) {
    sentences.push(`Transmits from ${formatAngle(sky.transmitElevationFromDeg)} up.`);
  }
  const sectors = sky.blocked?.length ?? 0;
  if (sectors > 0) {
    sentences.push(`${sectors} blocked ${sectors === 1 ? 'sector' : 'sectors'}.`);
  }
  if (sky.horizon && sky.horizon.length > 0) {
    const highest = Math.max(...sky.horizon.map((point) => point.elevationDeg));
    sentences.push(`Horizon up to ${formatAngle(highest, 0)}.`);
  }
  return sentences.length > 0 ? sentences : ['No limits given: taken as free down to 0°.'];
}
