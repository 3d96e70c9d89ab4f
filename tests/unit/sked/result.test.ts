import { describe, expect, it } from 'vitest';
import { disagreements, plainReport, reportNote, type SaidResult } from '~/domain/sked/result';
import { messageWordsSchema, plainWords } from '~/domain/sked/talk';

const said = (callSign: string, change: Partial<SaidResult> = {}): SaidResult => ({
  callSign,
  result: 'completed',
  reportSent: '',
  reportReceived: '',
  ...change,
});

describe('disagreements', () => {
  it('are none while one alone has spoken, or both say the same', () => {
    expect(disagreements([])).toEqual([]);
    expect(disagreements([said('QA1LUN', { reportSent: '-21' })])).toEqual([]);
    expect(
      disagreements([
        said('QA1LUN', { reportSent: '−07 dB', reportReceived: 'O' }),
        said('QB7TID', { reportSent: 'o', reportReceived: '-7' }),
      ]),
    ).toEqual([]);
  });

  it('say who says what', () => {
    expect(disagreements([said('QA1LUN'), said('QB7TID', { result: 'notHeard' })])).toEqual([
      'QA1LUN says completed, QB7TID says not heard.',
    ]);
    expect(
      disagreements([
        said('QC2FAR', { result: 'partly' }),
        said('QA1LUN'),
        said('QB7TID', { result: 'partly' }),
      ]),
    ).toEqual(['QA1LUN says completed, QC2FAR and QB7TID say partly.']);
  });

  it('tell what one sent and the other received, in both directions', () => {
    expect(
      disagreements([
        said('QA1LUN', { reportSent: '−21', reportReceived: 'R-19' }),
        said('QB7TID', { reportSent: '−19', reportReceived: '−24' }),
      ]),
    ).toEqual(['QA1LUN sent −21, QB7TID received −24.', 'QB7TID sent −19, QA1LUN received R-19.']);
  });

  it('do not compare reports among three, where nobody knows whom one was for', () => {
    const three = ['QA1LUN', 'QB7TID', 'QC2FAR'].map((callSign, index) =>
      said(callSign, { reportSent: `-${index + 10}`, reportReceived: '-30' }),
    );
    expect(disagreements(three)).toEqual([]);
  });
});

it.each([
  ['−07', '-7'],
  ['–7 dB', '-7'],
  ['+03', '3'],
  ['r-09', 'R-9'],
  ['559', '559'],
  [' ro ', 'RO'],
  ['00', '0'],
])('plainReport(%j) is %j', (typed, plain) => {
  expect(plainReport(typed)).toBe(plain);
});

it('speaks of reports as the mode has them', () => {
  expect(reportNote('cw')).toContain('T, M, O and RO');
  expect(reportNote('ssb')).toContain('RS');
  expect(reportNote('q65-60c')).toContain('−21');
});

describe('words of a message', () => {
  it('lose what could do harm and keep what was written', () => {
    expect(plainWords('a\r\nb\rc\u2028d')).toBe('a\nb\nc\nd');
    expect(plainWords('  x \n\n\n\n y\u0000\u001b[31m\u202etxt.exe  ')).toBe(
      'x\n\n y  [31m txt.exe',
    );
    expect(plainWords('<b>& "73" 🌙 Ελλάδα')).toBe('<b>& "73" 🌙 Ελλάδα');
  });

  it('are at least one and at most a thousand characters', () => {
    const message = (words: unknown) =>
      messageWordsSchema.safeParse(words).error?.issues[0]?.message;
    expect(message(' \n\u0007 ')).toBe('Write something first.');
    expect(message('🌙'.repeat(1000))).toBeUndefined();
    expect(message('x'.repeat(1001))).toBe('Keep the message under 1000 characters.');
    expect(message('x'.repeat(5000))).toBe('Keep the message under 1000 characters.');
    expect(message(undefined)).toBe('The message must be text.');
  });
});
