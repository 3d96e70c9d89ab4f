import { describe, expect, it } from 'vitest';
import { parseQuestion, questionParams, utcDate } from '~/domain/window/question';

const NOW_MS = Date.parse('2027-01-18T18:42:07Z');
const parse = (query: string) => parseQuestion(new URLSearchParams(query), NOW_MS);

describe('a question in an address', () => {
  it('comes back the same', () => {
    const query =
      'station=QA1LUN&station=JO97ee%40Europe%2FStockholm&station=QC2FAR&band=144&from=2027-02-01&days=45&low=8&low=&low=12.5&minutes=20&loss=3&mode=cw&margin=1.5&sun=15&count=any';
    const { question, problems } = parse(query);
    expect(problems).toEqual([]);
    expect(question).toEqual({
      stations: ['QA1LUN', 'JO97ee@Europe/Stockholm', 'QC2FAR'],
      band: '144',
      fromMs: Date.parse('2027-02-01T00:00:00Z'),
      days: 45,
      lowestDeg: [8, null, 12.5],
      minimumMinutes: 20,
      mode: 'cw',
      maximumDegradationDb: 3,
      minimumMarginDb: 1.5,
      minimumSunSeparationDeg: 15,
      counting: 'any',
    });
    expect(parse(questionParams(question).toString()).question).toEqual(question);
  });

  it('starts today, for thirty days, in hours when everybody is awake', () => {
    const { question, problems } = parse('station=QA1LUN');
    expect(problems).toEqual([]);
    expect(utcDate(question.fromMs)).toBe('2027-01-18');
    expect(question).toMatchObject({ days: 30, minimumMinutes: 30, counting: 'awake' });
    expect(question.lowestDeg).toEqual([null]);
  });

  it('takes empty fields of a form as not filled in', () => {
    const { question, problems } = parse('station=JO97ee&station=&station=FN43ev&from=&days=&low=');
    expect(problems).toEqual([]);
    expect(question.stations).toEqual(['JO97ee', 'FN43ev']);
  });

  it.each([
    ['from=2027-02-30', 'from', '2027-02-30'],
    ['from=18.1.2027', 'from', '18.1.2027'],
    ['days=6', 'days', '7 to 60'],
    ['days=61', 'days', '7 to 60'],
    ['days=many', 'days', 'not a number'],
    ['band=1297', 'band', '1297'],
    ['minutes=0', 'minutes', '1 to 1440'],
    ['loss=-1', 'loss', '0 to 30'],
    ['sun=NaN', 'sun', 'not a number'],
    ['mode=q66', 'mode', 'q66'],
    ['margin=50', 'margin', '\u221220 to 40'],
    ['station=QA1LUN&low=95', 'low', '\u22125 to 89'],
    ['station=QA1LUN&station=QA1LUN', 'station', 'named twice'],
  ])('says what is wrong with %s and keeps its default', (query, field, words) => {
    const { question, problems } = parse(query);
    expect(problems).toHaveLength(1);
    expect(problems[0]!.field).toBe(field);
    expect(problems[0]!.sentence).toContain(words);
    expect(question).toMatchObject({ days: 30, band: '1296', minimumMinutes: 30 });
    expect(utcDate(question.fromMs)).toBe('2027-01-18');
  });

  it('takes sixteen stations and says so about the rest', () => {
    const stations = Array.from({ length: 20 }, (_, index) => `station=QA${index}LUN`).join('&');
    const { question, problems } = parse(stations);
    expect(question.stations).toHaveLength(16);
    expect(question.lowestDeg).toHaveLength(16);
    expect(problems.map((problem) => problem.sentence)).toEqual([
      'At most 16 stations are compared at once.',
    ]);
  });
});
