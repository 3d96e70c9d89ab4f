import { MODES, type ModeId } from '../station/modes';

/** Bandwidth to which every signal-to-noise ratio here refers. */
export const REFERENCE_BANDWIDTH_HZ = 2500;

/** What a mode needs and how it is timed. */
export interface ModeFigures {
  id: ModeId;
  label: string;
  /** Signal-to-noise ratio in 2500 Hz at which half of the single periods are read, dB. */
  thresholdDb: number;
  /** Length of one T/R period, seconds. */
  periodS: number;
  /**
   * Distance of its tones, Hz: a wider echo costs. For CW the bandwidth within which an ear still gathers a tone
   * (estimate). Null: a spread echo costs nothing that could be counted.
   */
  resolutionHz: number | null;
  /** Where the threshold comes from. */
  source: string;
}

const Q65_SOURCE =
  'Artemis-DB entry 530, after the protocol’s quick-start guide (read in the source); tone spacings of the 60 s ' +
  'period likewise, of the other periods from memory.';
const JT65_SOURCE =
  '−24 dB (read in the source), −25 dB with soft decision (from memory); the former is taken. Tone spacing from memory.';

/** Threshold and the spacing of submode A; each further letter doubles it. The 15 s period is cut by the echo delay. */
const Q65_PERIODS: Record<string, readonly [thresholdDb: number, spacingHz: number]> = {
  '30': [-24.8, 12_000 / 3600],
  '60': [-27.6, 12_000 / 7200],
  '120': [-30.8, 12_000 / 16_000],
  '300': [-33.8, 12_000 / 41_472],
};

const JT65_SPACING_HZ = 11_025 / 4096;

/** Where CW changes from one-minute to 2.5-minute periods (handbook practice, read in the source). */
export const LONG_CW_FROM_MHZ = 300;

function figures(id: ModeId, label: string): ModeFigures {
  if (id === 'cw') {
    const source = 'By ear, from memory; the resolution of 50 Hz is an estimate.';
    return { id, label, thresholdDb: -15, periodS: 60, resolutionHz: 50, source };
  }
  if (id === 'ssb') {
    return { id, label, thresholdDb: 3, periodS: 60, resolutionHz: null, source: 'From memory.' };
  }
  const widening = 2 ** (id.charCodeAt(id.length - 1) - 'a'.charCodeAt(0));
  if (id.startsWith('jt65')) {
    const resolutionHz = JT65_SPACING_HZ * widening;
    return { id, label, thresholdDb: -24, periodS: 60, resolutionHz, source: JT65_SOURCE };
  }
  const period = id.slice('q65-'.length, -1);
  const [thresholdDb, spacingHz] = Q65_PERIODS[period]!;
  return {
    id,
    label,
    thresholdDb,
    periodS: Number(period),
    resolutionHz: spacingHz * widening,
    source: Q65_SOURCE,
  };
}

export const MODE_FIGURES: readonly ModeFigures[] = MODES.map(({ id, label }) =>
  figures(id, label),
);

const BY_ID = new Map<string, ModeFigures>(MODE_FIGURES.map((mode) => [mode.id, mode]));

/** Figures of a mode, or undefined for an id that is none. */
export function modeFigures(id: string): ModeFigures | undefined {
  return BY_ID.get(id);
}

/**
 * Length of one T/R period, seconds: of digital modes their own; of CW one minute below 300 MHz and 2.5 minutes from
 * there up (ARRL Handbook 1988, read in the source; two minutes are in use at 144 MHz too).
 */
export function periodS(mode: ModeFigures, frequencyMhz: number): number {
  return mode.id === 'cw' && frequencyMhz >= LONG_CW_FROM_MHZ ? 150 : mode.periodS;
}
