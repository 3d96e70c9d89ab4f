import { dialShifts, type DialConvention, type DialShift } from '../link/doppler';

export interface ConventionWords {
  label: string;
  /** What each station does. */
  sentence: string;
  /** What has to be agreed for the figures to hold. */
  alike: string;
}

/** The conventions for people; the two call signs in the order of the sked's parties. */
export function conventionWords(
  convention: DialConvention,
  [first, second]: readonly [string, string],
): ConventionWords {
  switch (convention) {
    case 'constantAtMoon':
      return {
        label: 'Constant at the Moon',
        sentence:
          'Each station takes half of its own echo’s Doppler off when it transmits, so that all arrive at the Moon on the agreed frequency, and adds it when it listens.',
        alike: 'All sides must do alike, or you miss each other by the difference.',
      };
    case 'none':
      return {
        label: 'No correction',
        sentence:
          'Everybody stays on the agreed frequency; the partner is found beside it by tuning.',
        alike: 'It is enough that everybody transmits there; how each listens is its own affair.',
      };
    case 'firstCorrectsAll':
    case 'secondCorrectsAll': {
      const corrects = convention === 'firstCorrectsAll' ? first : second;
      const stays = convention === 'firstCorrectsAll' ? second : first;
      return {
        label: `${corrects} corrects all`,
        sentence: `${corrects} corrects the whole mutual Doppler, transmitting and listening; ${stays} stays on the agreed frequency for both.`,
        alike: `Agree on it: ${stays} must leave the dial alone.`,
      };
    }
    case 'receiveOnly':
      return {
        label: 'Correction on receive only',
        sentence:
          'Everybody transmits on the agreed frequency and listens beside it by the mutual Doppler.',
        alike: 'It is enough that everybody transmits there; how each listens is its own affair.',
      };
    case 'ownEchoOnFrequency':
      return {
        label: 'Own echo on the frequency',
        sentence:
          'Each station transmits so that its own echo comes back on the agreed frequency, and listens beside it for the partner.',
        alike: 'All sides must do alike, or you miss each other by the difference.',
      };
  }
}

/** With more than two stations nobody can correct for one partner alone. */
export function isForPairsOnly(convention: DialConvention): boolean {
  return convention === 'firstCorrectsAll' || convention === 'secondCorrectsAll';
}

/**
 * Dial shifts of one station towards a partner. `ownFirst`: whether it stands before the partner in the order of the
 * sked's parties.
 */
export function dialTowards(
  convention: DialConvention,
  ownEchoHz: number,
  partnerEchoHz: number,
  ownFirst: boolean,
): DialShift {
  return ownFirst
    ? dialShifts(ownEchoHz, partnerEchoHz)[convention].first
    : dialShifts(partnerEchoHz, ownEchoHz)[convention].second;
}

/** Dials are read to 1 Hz below 1.3 GHz, to 10 Hz from there on. */
export function dialStepHz(frequencyMhz: number): 1 | 10 {
  return frequencyMhz < 1300 ? 1 : 10;
}

/** "1296 065.260": the dial in kHz with the MHz set apart, to 1 or 10 Hz. */
export function formatDial(frequencyMhz: number, shiftHz: number): string {
  const stepHz = dialStepHz(frequencyMhz);
  const hz = Math.round((frequencyMhz * 1e6 + shiftHz) / stepHz) * stepHz;
  const mhz = Math.floor(hz / 1e6);
  const khz = ((hz - mhz * 1e6) / 1000).toFixed(stepHz === 1 ? 3 : 2);
  return `${mhz}\u00a0${khz.padStart(stepHz === 1 ? 7 : 6, '0')}`;
}
