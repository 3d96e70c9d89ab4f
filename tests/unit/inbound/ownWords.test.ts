import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ownWords } from '~/server/inbound/ownWords';

describe('what somebody wrote in an answer', () => {
  it.each([
    [
      'quoted below',
      'Fine.\n\nOn Mon, 18 Jan 2027 at 19:42, Echotide wrote:\n> Offer\n> More',
      'Fine.',
    ],
    [
      'introduced over two lines',
      'Fine.\n\nOn Mon, 18 Jan 2027 at 19:42, Echotide <mail@echotide.example>\nwrote:\n> Offer',
      'Fine.',
    ],
    [
      'introduced in another language',
      'Bon.\n\nLe lun. 18 janv. 2027 à 19:42, X a écrit :\n\n> Offre',
      'Bon.',
    ],
    ['answered in between', '> 22:00?\n22:15 is better.\n> 1296?\nYes.', '22:15 is better.\nYes.'],
    ['signature', 'Fine.\n-- \nEdda\nQB7TID', 'Fine.'],
    ['a signature whose space got lost', 'Fine.\n--\nEdda', 'Fine.'],
    ['a divider', 'Fine.\n\n-----Original Message-----\nFrom: a@b.example', 'Fine.'],
    ['a rule', 'Fine.\n________________________________\nFrom: Echotide', 'Fine.'],
    [
      'a quoted head',
      'Fine.\n\nVon: Echotide <mail@echotide.example>\nGesendet: Montag, 18. Januar 2027\nAn: Edda\n\nOffer',
      'Fine.',
    ],
    ['carriage returns', 'One\r\n\r\n\r\n\r\nTwo\r\n', 'One\n\nTwo'],
    ['nothing of one’s own', 'On Mon, Echotide wrote:\n> Offer', ''],
    [
      'a list with a colon',
      'Two things:\nthe feed, and the dish.',
      'Two things:\nthe feed, and the dish.',
    ],
    ['times', 'UTC: 22:00\nlocal: 23:00', 'UTC: 22:00\nlocal: 23:00'],
  ])('is kept without the rest: %s', (_name, text, own) => {
    expect(ownWords(text)).toBe(own);
  });

  it('never holds a quoted line, and ends for any text', () => {
    const line = fc.oneof(
      fc.string(),
      fc.string().map((text) => `> ${text}`),
      fc.constant('-- '),
    );
    fc.assert(
      fc.property(fc.array(line, { maxLength: 30 }), (lines) => {
        const own = ownWords(lines.join('\n'));
        expect(own.split('\n').some((one) => /^\s*>/.test(one))).toBe(false);
        expect(own).toBe(own.trim());
      }),
      { numRuns: 300, seed: 5322 },
    );
  });
});
