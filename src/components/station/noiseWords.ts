import type { NoiseMethod, NoiseRecord } from '../../domain/station/noiseRecord';
import { formatDay, formatNumber } from '../../domain/time/format';

export const METHOD_WORDS: Record<NoiseMethod, string> = {
  hotCold: 'Hot load, cold sky',
  sun: 'Cold sky, Sun',
};

/** "18 Jan 2027" of the day of a record. */
export function recordDay(measuredOn: string): string {
  return formatDay(Date.parse(`${measuredOn}T00:00Z`), { withYear: true }).slice(4);
}

/** "63.1 K, measured on 18 Jan 2027 with the Sun." */
export function noiseWords({ figures, measuredOn, measurement }: NoiseRecord): string {
  const how = measurement.method === 'sun' ? 'with the Sun' : 'with a hot load';
  return `${formatNumber(figures.systemTemperatureK, 1)} K, measured on ${recordDay(measuredOn)} ${how}.`;
}
