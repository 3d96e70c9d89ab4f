import type { BandId } from '../../src/domain/station/bands';
import type { ModeId } from '../../src/domain/station/modes';
import type { SkedResult } from '../../src/domain/sked/types';

/** When something is done: hours from now (negative: ago), or minutes from the start or end of the slot. */
export type StepTime = { inHours: number } | { afterStartMin: number } | { afterEndMin: number };

/** The keeper of the first or of the last of the stations. */
type Actor = 'FIRST' | 'LAST';

export type StoryStep = { when: StepTime; words?: string } & (
  | { do: 'accept' | 'decline' | 'withdraw' | 'cancel'; by: Actor }
  | { do: 'move'; by: Actor; laterMin: number }
  | { do: 'report'; by: Actor; result: SkedResult }
  | { do: 'lapse' }
);

/**
 * One sked of the demo, as its people lived it. `stations`: the offering one first. The slot lies in a common
 * window between the two distances from now. Where these stations have none, one of `insteadOf` takes the
 * place of the last; where none of them has one either, the search goes on to `untilHours`.
 */
export interface SkedStory {
  stations: string[];
  insteadOf?: string[];
  band: BandId;
  mode: ModeId;
  minutes: number;
  fromHours: number;
  toHours: number;
  untilHours: number;
  offeredAt: StepTime;
  /** Key of the person who offers; absent: the keeper of the first station. */
  offeredBy?: string;
  words: string;
  steps: StoryStep[];
}

const hours = (inHours: number): StepTime => ({ inHours });
const afterEnd = (afterEndMin: number): StepTime => ({ afterEndMin });

/** What has happened in the last weeks. Every instant of it lies in the past. */
const PAST: SkedStory[] = [
  {
    stations: ['QA1LUN', 'QK3OSL'],
    insteadOf: ['QG8PEL', 'QI2CED', 'QY1FEN', 'QL1RIC', 'QS7DUN'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 45,
    fromHours: -34,
    toHours: -12,
    untilHours: -310,
    offeredAt: hours(-330),
    words: 'A first try with the new amplifier.',
    steps: [
      { do: 'accept', by: 'LAST', when: hours(-320) },
      { do: 'report', by: 'LAST', when: afterEnd(20), result: 'completed', words: 'Easy copy.' },
    ],
  },
  {
    stations: ['QA1LUN', 'QI2CED'],
    insteadOf: ['QG8PEL', 'QE4MOR'],
    band: '1296',
    mode: 'cw',
    minutes: 30,
    fromHours: -130,
    toHours: -50,
    untilHours: -400,
    offeredAt: hours(-450),
    words: 'CW only, ten minutes each way and then we see.',
    steps: [
      { do: 'accept', by: 'LAST', when: hours(-440) },
      {
        do: 'report',
        by: 'FIRST',
        when: afterEnd(15),
        result: 'partly',
        words: 'O received, your R never came.',
      },
      { do: 'report', by: 'LAST', when: afterEnd(70), result: 'partly' },
    ],
  },
  {
    stations: ['QK3OSL', 'QL1RIC'],
    insteadOf: ['QH3VOR', 'QD5ALD'],
    band: '432',
    mode: 'q65-60b',
    minutes: 60,
    fromHours: -200,
    toHours: -60,
    untilHours: -420,
    offeredAt: hours(-460),
    words: '',
    steps: [
      { do: 'accept', by: 'LAST', when: hours(-455) },
      {
        do: 'report',
        by: 'FIRST',
        when: afterEnd(5),
        result: 'notHeard',
        words: 'Nothing but the rain.',
      },
      { do: 'report', by: 'LAST', when: afterEnd(600), result: 'notHeard' },
    ],
  },
  {
    stations: ['QB7TID', 'QP4STE'],
    insteadOf: ['QX4TOR', 'QD5ALD'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 30,
    fromHours: -220,
    toHours: -40,
    untilHours: -460,
    offeredAt: hours(-480),
    words: 'Your silo against my ridge.',
    steps: [
      { do: 'accept', by: 'LAST', when: hours(-470) },
      { do: 'report', by: 'FIRST', when: afterEnd(12), result: 'completed' },
      {
        do: 'report',
        by: 'LAST',
        when: afterEnd(14),
        result: 'completed',
        words: 'Seventh period.',
      },
    ],
  },
  {
    stations: ['QM2SAN', 'QJ4NIM'],
    insteadOf: ['QW8MIR', 'QO1BRA'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 60,
    fromHours: -150,
    toHours: -30,
    untilHours: -400,
    offeredAt: hours(-430),
    words: '',
    steps: [
      { do: 'accept', by: 'LAST', when: hours(-420) },
      { do: 'report', by: 'LAST', when: afterEnd(30), result: 'completed' },
    ],
  },
  {
    stations: ['QY1FEN', 'QA1LUN'],
    band: '10368',
    mode: 'q65-60d',
    minutes: 45,
    fromHours: -160,
    toHours: -20,
    untilHours: -480,
    offeredAt: hours(-500),
    words: 'Three centimetres, if the wind lets us.',
    steps: [{ do: 'lapse', when: { afterStartMin: 1 } }],
  },
  {
    stations: ['QC2FAR', 'QK3OSL'],
    insteadOf: ['QG8PEL', 'QD5ALD'],
    band: '144',
    mode: 'jt65b',
    minutes: 60,
    fromHours: -250,
    toHours: -100,
    untilHours: -500,
    offeredAt: hours(-560),
    words: 'At moonrise, my antennas do not tilt.',
    steps: [{ do: 'lapse', when: { afterStartMin: 1 } }],
  },
];

/** What was called off. */
const CALLED_OFF: SkedStory[] = [
  {
    stations: ['QB7TID', 'QA1LUN'],
    insteadOf: ['QI2CED', 'QG8PEL', 'QV3HAL', 'QN9WEX'],
    band: '432',
    mode: 'q65-60b',
    minutes: 45,
    fromHours: 60,
    toHours: 200,
    untilHours: 700,
    offeredAt: hours(-52),
    words: '70 cm for a change?',
    steps: [
      {
        do: 'decline',
        by: 'LAST',
        when: hours(-44),
        words: 'The array is down for new cables until next month.',
      },
    ],
  },
  {
    stations: ['QA1LUN', 'QR5KEL'],
    insteadOf: ['QP4STE', 'QD5ALD', 'QN9WEX'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 30,
    fromHours: 70,
    toHours: 260,
    untilHours: 700,
    offeredAt: hours(-75),
    words: 'Short, but the sky is cold.',
    steps: [
      {
        do: 'withdraw',
        by: 'FIRST',
        when: hours(-73),
        words: 'I read the wrong day. A better offer follows.',
      },
    ],
  },
  {
    stations: ['QK3OSL', 'QA1LUN'],
    band: '1296',
    mode: 'cw',
    minutes: 60,
    fromHours: 40,
    toHours: 180,
    untilHours: 700,
    offeredAt: hours(-140),
    words: 'The crew wants to hear your new feed.',
    steps: [
      { do: 'accept', by: 'LAST', when: hours(-130) },
      {
        do: 'cancel',
        by: 'FIRST',
        when: hours(-26),
        words: 'Storm warning, the dish stays stowed.',
      },
    ],
  },
  {
    stations: ['QE4MOR', 'QY1FEN'],
    insteadOf: ['QG8PEL', 'QK3OSL'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 30,
    fromHours: 50,
    toHours: 200,
    untilHours: 700,
    offeredAt: hours(-60),
    words: '',
    steps: [{ do: 'decline', by: 'LAST', when: hours(-41), words: 'Away that evening.' }],
  },
];

/** What is agreed. */
const AGREED: SkedStory[] = [
  {
    stations: ['QA1LUN', 'QB7TID'],
    insteadOf: [
      'QK3OSL',
      'QI2CED',
      'QE4MOR',
      'QL1RIC',
      'QJ4NIM',
      'QH3VOR',
      'QS7DUN',
      'QY1FEN',
      'QG8PEL',
    ],
    band: '1296',
    mode: 'q65-60c',
    minutes: 60,
    fromHours: 2,
    toHours: 36,
    untilHours: 400,
    offeredAt: hours(-96),
    words: 'The Moon is close and the sky is cold. Shall we?',
    steps: [{ do: 'accept', by: 'LAST', when: hours(-80), words: 'We shall.' }],
  },
  {
    stations: ['QE4MOR', 'QA1LUN'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 45,
    fromHours: 120,
    toHours: 300,
    untilHours: 700,
    offeredAt: hours(-70),
    words: '',
    steps: [
      {
        do: 'move',
        by: 'LAST',
        laterMin: 30,
        when: hours(-66),
        words: 'Half an hour later, after supper.',
      },
      { do: 'accept', by: 'FIRST', when: hours(-50) },
    ],
  },
  {
    stations: ['QA1LUN', 'QH3VOR'],
    insteadOf: ['QZ5ORB', 'QS7DUN', 'QF6GAM'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 60,
    fromHours: 200,
    toHours: 500,
    untilHours: 900,
    offeredAt: hours(-30),
    words: '',
    steps: [{ do: 'accept', by: 'LAST', when: hours(-18) }],
  },
  {
    stations: ['QB7TID', 'QN9WEX'],
    insteadOf: ['QX4TOR', 'QD5ALD'],
    band: '1296',
    mode: 'cw',
    minutes: 30,
    fromHours: 24,
    toHours: 120,
    untilHours: 500,
    offeredAt: hours(-48),
    words: 'A short one over the water.',
    steps: [{ do: 'accept', by: 'LAST', when: hours(-40) }],
  },
  {
    stations: ['QK3OSL', 'QD5ALD'],
    insteadOf: ['QP4STE', 'QL1RIC'],
    band: '432',
    mode: 'q65-60b',
    minutes: 60,
    fromHours: 30,
    toHours: 160,
    untilHours: 600,
    offeredAt: hours(-88),
    words: 'Club against club.',
    steps: [
      { do: 'accept', by: 'LAST', when: hours(-60), words: 'All three of us will be there.' },
    ],
  },
  {
    stations: ['QJ4NIM', 'QM2SAN'],
    insteadOf: ['QW8MIR', 'QF6GAM'],
    band: '432',
    mode: 'q65-60b',
    minutes: 45,
    fromHours: 20,
    toHours: 140,
    untilHours: 600,
    offeredAt: hours(-90),
    words: '',
    steps: [{ do: 'accept', by: 'LAST', when: hours(-85) }],
  },
  {
    stations: ['QI2CED', 'QV3HAL'],
    insteadOf: ['QK3OSL', 'QY1FEN'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 30,
    fromHours: 50,
    toHours: 260,
    untilHours: 700,
    offeredAt: hours(-33),
    words: '',
    steps: [{ do: 'accept', by: 'LAST', when: hours(-21) }],
  },
];

/** What waits for an answer. The newest come last. */
const OPEN: SkedStory[] = [
  {
    stations: ['QA1LUN', 'QI2CED'],
    insteadOf: ['QL1RIC', 'QY1FEN'],
    band: '1296',
    mode: 'cw',
    minutes: 30,
    fromHours: 72,
    toHours: 280,
    untilHours: 800,
    offeredAt: hours(-20),
    words: 'Once more in CW, with both of us awake this time.',
    steps: [],
  },
  {
    stations: ['QA1LUN', 'QL1RIC', 'QK3OSL'],
    insteadOf: ['QI2CED', 'QD5ALD'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 60,
    fromHours: 90,
    toHours: 400,
    untilHours: 900,
    offeredAt: hours(-28),
    words: 'Three of us in one window.',
    steps: [{ do: 'accept', by: 'LAST', when: hours(-10) }],
  },
  {
    stations: ['QT2ZEP', 'QF6GAM'],
    insteadOf: ['QS7DUN', 'QJ4NIM', 'QW8MIR'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 30,
    fromHours: 60,
    toHours: 300,
    untilHours: 900,
    offeredAt: hours(-15),
    words: '',
    steps: [],
  },
  {
    stations: ['QK3OSL', 'QB7TID'],
    insteadOf: ['QN9WEX', 'QD5ALD'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 30,
    fromHours: 60,
    toHours: 280,
    untilHours: 800,
    offeredAt: hours(-12),
    offeredBy: 'keld',
    words: 'It is me at the desk this time, and I have never worked you.',
    steps: [],
  },
  {
    stations: ['QA1LUN', 'QB7TID'],
    insteadOf: ['QG8PEL', 'QE4MOR'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 45,
    fromHours: 48,
    toHours: 220,
    untilHours: 800,
    offeredAt: hours(-22),
    words: 'Earlier is better for me, I work in the morning.',
    steps: [
      {
        do: 'move',
        by: 'LAST',
        laterMin: 15,
        when: hours(-5),
        words: 'I cannot be in the shack before that. A quarter of an hour later works.',
      },
    ],
  },
  {
    stations: ['QE4MOR', 'QA1LUN'],
    band: '1296',
    mode: 'q65-60c',
    minutes: 45,
    fromHours: 80,
    toHours: 330,
    untilHours: 800,
    offeredAt: hours(-2),
    words: '',
    steps: [],
  },
];

/** Planned in this order: what is most wanted gets the first choice of the windows. */
export const SKED_STORIES: readonly SkedStory[] = [...AGREED, ...OPEN, ...CALLED_OFF, ...PAST];
