import { describe, expect, it } from 'vitest';
import { MOST_LINES, readRosterRecords } from '~/domain/activity/rosterCsv';
import { parseRosterCsv } from '~/server/activities/parseRosterCsv';

const HEAD = 'call sign,mail,locator,bands,most contacts,coming,note';

function read(text: string) {
  const records = parseRosterCsv(text);
  if (!Array.isArray(records)) return { lines: [], problems: [records] };
  return readRosterRecords(records, ['432', '1296', '10368']);
}

const told = (text: string) => read(text).problems.map(({ line, message }) => `${line} ${message}`);

describe('a roster file', () => {
  it('is read with commas, semicolons or tabs, with a byte order mark and columns in any order', () => {
    const expected = {
      line: 2,
      callSign: 'QB2MUR',
      mail: 'murka@qb2mur.example',
      locator: 'KO26ab',
      bands: ['432', '10368'],
      mostContacts: 7,
      coming: true,
      note: 'Only after sunset, please',
    };
    const plain = `${HEAD}\nqb2mur,Murka@QB2MUR.example,ko26AB,10 GHz 432,7,yes,"Only after sunset, please"\n`;
    expect(read(plain)).toEqual({ lines: [expected], problems: [] });
    const semicolons =
      '\ufeffNote;Call sign;Most contacts;Bands;Mail;Locator;Coming\r\n' +
      'Only after sunset, please;QB2MUR;7;432,10GHz;murka@qb2mur.example;KO26ab;y\r\n';
    expect(read(semicolons)).toEqual({ lines: [expected], problems: [] });
    const tabs = `call sign\tbands\nQB2MUR\t432 / 1296\n`;
    expect(read(tabs).lines).toMatchObject([{ callSign: 'QB2MUR', bands: ['432', '1296'] }]);
  });

  it('tells every wrong line by its number and keeps the right ones', () => {
    const text = [
      HEAD,
      'QA1LUN,,,,,,',
      'nonsense,,,,,,',
      'QB7TID,,ZZ99,,,,',
      '',
      'QC2FAR,,,50,,,',
      'QD5ALD,,,seven,,,',
      'QE4MOR,,,,many,,',
      'QF6GAM,,,,,perhaps,',
      'QA1LUN,,,,,,again',
      'QG8PEL,,,,,,,one cell too many',
    ].join('\n');
    expect(read(text).lines.map(({ callSign }) => callSign)).toEqual(['QA1LUN']);
    expect(told(text)).toEqual([
      '3 “nonsense”: A call sign has a prefix, a digit and letters at its end, such as QA1LUN.',
      expect.stringMatching(/^4 The first pair of the locator “ZZ99”/),
      '6 50 MHz is not a band of this activity.',
      '7 “seven” is not a band, such as 432 or 10 GHz.',
      '8 Most contacts “many” must be a whole number from 1 to 999, or nothing.',
      '9 Coming “perhaps” must be yes, no or nothing.',
      '10 QA1LUN stands on line 2 already.',
      '11 “one cell too many” stands in no column.',
    ]);
  });

  it('counts lines right behind a cell of several lines', () => {
    expect(told(`${HEAD}\nQA1LUN,,,,,,"one\ntwo"\nnonsense,,,,,,`)[0]).toMatch(/^4 /);
  });

  it.each([
    ['', /empty/],
    [HEAD, /no line below/],
    ['QA1LUN,QB7TID', /no column “QA1LUN”/],
    ['mail,locator\na@b.example,JO97', /“call sign”/],
    ['call sign,call sign\nQA1LUN,QB7TID', /there twice/],
    [`${HEAD}\nQA1LUN,"never closed`, /never closed/],
    [`${HEAD}\nQA1"LUN",,,,,,`, /middle of a cell/],
  ])('refuses what is no roster: %j', (text, message) => {
    const { lines, problems } = read(text);
    expect(lines).toEqual([]);
    expect(problems[0]?.message).toMatch(message);
  });

  it('refuses a line of a megabyte', () => {
    const { lines, problems } = read(`${HEAD}\nQA1LUN,,,,,,${'x'.repeat(1_000_000)}`);
    expect(lines).toEqual([]);
    expect(problems[0]?.message).toMatch(/longer than 8000 characters/);
    expect(read('x'.repeat(1_000_000)).problems[0]?.message).toMatch(/longer than 8000/);
  });

  it('reads so many lines and no more', () => {
    const rows = Array.from(
      { length: MOST_LINES + 50 },
      (_, i) => `Q${i % 10}AB${'CDEFGHIJKL'[Math.floor(i / 10) % 10]}${i}Z`,
    );
    const { lines, problems } = read(`call sign\n${rows.join('\n')}`);
    expect(lines.length + problems.length).toBe(MOST_LINES + 1);
    expect(problems.at(-1)?.message).toBe(`At most ${MOST_LINES} lines are read.`);
  });

  it('takes formulas, markup and control characters as text', () => {
    const { lines } = read(
      `${HEAD}\nQA1LUN,,,,,,"=HYPERLINK(""http://x.example"")<script>\u0000\u202eabc"`,
    );
    expect(lines[0]?.note).toBe('=HYPERLINK("http://x.example")<script> abc');
  });
});
