import type { Script, Stage } from './smtpFake';

/** What a mail server of ours does in one round. */
export const MOODS = [
  'behaves',
  'refuses connections',
  'hangs',
  'answers 4xx',
  'answers 5xx to the mail',
  'cuts the line before the message',
  'cuts the line after the message, which it does not keep',
  'cuts the line after the message, which it keeps',
  'keeps the message and says nothing',
  'cuts the line after its 250',
] as const;
export type Mood = (typeof MOODS)[number];

/** Always the same numbers for a seed, 0 … below 1: a xorshift of 32 bits. */
export function seededRandom(seed: number): () => number {
  let state = (seed * 2_654_435_761) | 1;
  return () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 4_294_967_296;
  };
}

export function pick<T>(random: () => number, from: readonly T[]): T {
  return from[Math.floor(random() * from.length)]!;
}

const REPLIES: Record<Stage, string> = {
  greeting: '421 4.3.2 closing down',
  hello: '421 4.3.2 closing down',
  mail: '452 4.3.1 no room',
  rcpt: '450 4.2.1 mailbox busy',
  data: '451 4.3.0 try later',
  message: '451 4.3.0 try later',
};
const BEFORE_MESSAGE = ['greeting', 'hello', 'mail', 'rcpt', 'data'] as const;
const REFUSABLE = ['mail', 'rcpt', 'data', 'message'] as const;

/** The conversation of one connection in that mood, and whether the server keeps a message it got. */
export function scriptFor(mood: Mood, random: () => number): { script: Script; keeps: boolean } {
  switch (mood) {
    case 'behaves':
    case 'refuses connections':
      return { script: {}, keeps: true };
    case 'hangs':
      return { script: { [pick(random, BEFORE_MESSAGE)]: 'hang' }, keeps: true };
    case 'answers 4xx': {
      const stage = pick(random, [...BEFORE_MESSAGE, 'message'] as const);
      return { script: { [stage]: REPLIES[stage] }, keeps: stage !== 'message' };
    }
    case 'answers 5xx to the mail': {
      const stage = pick(random, REFUSABLE);
      return { script: { [stage]: '554 5.7.0 not this one' }, keeps: stage !== 'message' };
    }
    case 'cuts the line before the message': {
      const stage = pick(random, BEFORE_MESSAGE);
      const after: Script = { cutAfter: stage };
      return { script: random() < 0.5 ? after : { [stage]: 'drop' }, keeps: true };
    }
    case 'cuts the line after the message, which it does not keep':
      return { script: { message: 'drop' }, keeps: false };
    case 'cuts the line after the message, which it keeps':
      return { script: { message: 'drop' }, keeps: true };
    case 'keeps the message and says nothing':
      return { script: { message: 'hang' }, keeps: true };
    case 'cuts the line after its 250':
      return { script: { cutAfter: 'message' }, keeps: true };
  }
}
