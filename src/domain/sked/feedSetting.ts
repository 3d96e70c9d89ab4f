import {
  FARADAY_UNKNOWN_BELOW_MHZ,
  linearLossDb,
  meetingLossDb,
  polarizationMeeting,
  polarizationOffsetDeg,
  typicalFaraday,
} from '../link/polarization';
import type { Polarization } from '../station/setup';
import { formatAngle, formatNumber } from '../time/format';

export interface PairAngles {
  /** At the Moon, of both stations. */
  ownParallacticDeg: number;
  partnerParallacticDeg: number;
}

/**
 * How far to turn the own feed out of the horizontal so that it lies as the partner's horizontal does at the Moon,
 * −90 … below 90, clockwise positive as seen from behind the dish towards the Moon. Position angles grow from north
 * through east, which is anticlockwise when looking up.
 */
export function turnDeg({ ownParallacticDeg, partnerParallacticDeg }: PairAngles): number {
  const offset = polarizationOffsetDeg(ownParallacticDeg, partnerParallacticDeg);
  return offset >= 90 ? offset - 180 : offset;
}

const isCircular = (polarization: Polarization) =>
  polarization === 'rightCircular' || polarization === 'leftCircular';

const CIRCULAR_NAMES: Partial<Record<Polarization, string>> = {
  rightCircular: 'right circular',
  leftCircular: 'left circular',
};

/** What to set at the own feed for this partner, in sentences; feeds null where the equipment is not known. */
export function feedSentences(
  own: Polarization | null,
  partner: Polarization | null,
  partnerCallSign: string,
  frequencyMhz: number,
  angles: { start: PairAngles; middle: PairAngles; end: PairAngles },
): string[] {
  if (own && isCircular(own)) return circularSentences(own, partner, partnerCallSign);
  if (partner && isCircular(partner)) {
    return [
      `${partnerCallSign} is ${CIRCULAR_NAMES[partner]}: any angle of your linear feed loses the same 3 dB. Nothing to turn.`,
    ];
  }
  const turns = [angles.start, angles.middle, angles.end].map(turnDeg);
  const offset = `Offset between the two horizontals at the Moon: ${turns
    .map((turn) => formatAngle(turn, 0))
    .join(', ')} at the start, in the middle and at the end.`;
  const unknown = frequencyMhz < FARADAY_UNKNOWN_BELOW_MHZ;
  return [
    offset,
    ...linearSentences(own, partner, partnerCallSign, turns[1]!, unknown, frequencyMhz),
    faradaySentence(frequencyMhz),
  ];
}

function circularSentences(
  own: Polarization,
  partner: Polarization | null,
  callSign: string,
): string[] {
  const transmit = CIRCULAR_NAMES[own]!;
  const receive = own === 'rightCircular' ? 'left circular' : 'right circular';
  const set = `Transmit ${transmit}, receive ${receive}: the Moon turns the sense round.`;
  if (!partner) return [set];
  if (!isCircular(partner)) return [set, `${callSign} is linear: 3 dB less, at any angle.`];
  return own === partner
    ? [set, `${callSign} does the same. Nothing to turn.`]
    : [
        set,
        `${callSign} is set to ${CIRCULAR_NAMES[partner]}: crossed, about 22 dB less. One of you changes the sense.`,
      ];
}

function linearSentences(
  own: Polarization | null,
  partner: Polarization | null,
  callSign: string,
  middleTurnDeg: number,
  unknown: boolean,
  frequencyMhz: number,
): string[] {
  const theirs = partner === 'vertical' ? 90 : 0;
  const turn = wrap90(middleTurnDeg + theirs);
  const way = turn < 0 ? 'anticlockwise' : 'clockwise';
  const setting =
    Math.abs(turn) < 0.5
      ? 'leave it horizontal'
      : `turn it ${formatAngle(Math.abs(turn), 0)} ${way} out of the horizontal, as seen from behind the dish towards the Moon`;
  if (own === 'rotatable') {
    return [
      `Your feed can be turned. ${unknown ? 'As a start' : 'For this partner'} ${setting}${
        partner === 'rotatable' ? `, while ${callSign} stays horizontal` : ''
      }.${unknown ? ' Listening, turn to the loudest; transmitting, try 90° from there too.' : ''}`,
    ];
  }
  if (partner === 'rotatable') {
    return [`${callSign} turns its feed to yours. Tell them yours is ${own ?? 'not described'}.`];
  }
  if (!own || !partner) return ['With both feeds described, the loss would stand here.'];
  if (unknown) {
    return [
      'Neither feed turns, and the ionosphere adds an angle of its own: wait for it to come round, in ten minutes to an hour.',
    ];
  }
  const meeting = polarizationMeeting(own, partner, frequencyMhz);
  const lossDb = meetingLossDb(meeting, middleTurnDeg);
  const crossed = lossDb > 10 ? ' Nearly crossed: another hour would be better.' : '';
  return [`Neither feed turns: ${formatNumber(lossDb, 1)} dB are lost both ways.${crossed}`];
}

function faradaySentence(frequencyMhz: number): string {
  const { typical, least, most } = typicalFaraday(frequencyMhz);
  if (frequencyMhz < FARADAY_UNKNOWN_BELOW_MHZ) {
    return `Faraday rotation is not known: at the zenith some ${formatNumber(typical)}° one way, anything from ${formatNumber(least)}° to ${formatNumber(most)}°, more at low elevations. It adds up both ways in the same sense, so one direction may be read while the other is not.`;
  }
  const lossDb = linearLossDb(Math.min(2 * most, 90));
  return `Faraday rotation is small here, about ${formatNumber(typical, 1)}° one way, at most a tenfold${
    lossDb >= 1 ? ' on a very active day' : ''
  }.`;
}

function wrap90(angleDeg: number): number {
  const wrapped = ((angleDeg % 180) + 180) % 180;
  return wrapped >= 90 ? wrapped - 180 : wrapped;
}
