import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseHorizonCsv } from '../../../src/domain/station/horizonCsv';
import { horizonSchema } from '../../../src/domain/station/skySchema';

const points = (text: string) => {
  const { points: found, problems } = parseHorizonCsv(text);
  expect(problems).toEqual([]);
  return found.map((point) => [point.azimuthDeg, point.elevationDeg]);
};
const problems = (text: string) => {
  const { points: found, problems: wrong } = parseHorizonCsv(text);
  expect(found).toEqual([]);
  return wrong.map((problem) => problem.message);
};

describe('horizon CSV', () => {
  it('reads commas, semicolons with decimal commas, and tabs', () => {
    expect(points('0,1.5\n90,2')).toEqual([
      [0, 1.5],
      [90, 2],
    ]);
    expect(points('0;1,5\r\n90;2')).toEqual([
      [0, 1.5],
      [90, 2],
    ]);
    expect(points('0\t1.5\r90\t2,25')).toEqual([
      [0, 1.5],
      [90, 2.25],
    ]);
  });

  it('passes over a head, comments, empty lines, BOM, quotes and degree signs', () => {
    expect(
      points('\uFEFF# from the theodolite\n\nazimuth,elevation\n"10","\u22121.5"\n 20° , 3 ,\n'),
    ).toEqual([
      [10, -1.5],
      [20, 3],
    ]);
  });

  it('follows a head that names the elevation first', () => {
    expect(points('Elevation;Azimuth\n3;10\n4;20')).toEqual([
      [10, 3],
      [20, 4],
    ]);
  });

  it('sorts, and takes 360 as 0', () => {
    expect(points('180,2\n360,1\n90,3')).toEqual([
      [0, 1],
      [90, 3],
      [180, 2],
    ]);
    expect(points('0,1\n90,2\n360,1')).toEqual([
      [0, 1],
      [90, 2],
    ]);
  });

  it('names the line of each problem and accepts nothing', () => {
    expect(problems(`${'1,1\n'.slice(0, 4)}372,2`)).toEqual(['Line 2: azimuth 372 is over 360.']);
    expect(problems('0,1\nten,2\n20,two')).toEqual([
      'Line 2: azimuth “ten” is not a number.',
      'Line 3: elevation “two” is not a number.',
    ]);
    expect(problems('0,1\n10,95\n10,-91')).toEqual([
      'Line 2: elevation 95 is over 90.',
      'Line 3: elevation -91 is under −90.',
    ]);
    expect(problems('0,1\n-10,5')).toEqual(['Line 2: azimuth -10 is under 0.']);
    expect(problems('0,1\n10,2\n10,3')).toEqual(['Line 3: azimuth 10 already stands in line 2.']);
    expect(problems('0,1\n360,3')).toEqual(['Line 2: north, 0 or 360, already stands in line 1.']);
    expect(problems('0,1\n5')).toEqual([
      'Line 2: 1 column found where azimuth and elevation are needed.',
    ]);
    expect(problems('10,5,3,2\n')[0]).toContain('semicolons');
    expect(problems('1e3,2')).toEqual(['Line 1: azimuth “1e3” is not a number.']);
  });

  it('refuses an empty file and one that is too large', () => {
    expect(problems('')).toEqual(['The file holds no points.']);
    expect(problems('azimuth,elevation\n')).toEqual(['The file holds no points.']);
    expect(problems(`0,1\n${'#'.repeat(100_001)}`)).toEqual(['The file is larger than 100 kB.']);
    expect(problems('\n'.repeat(2001))).toEqual(['The file has more than 2000 lines.']);
    const many = Array.from({ length: 721 }, (_, i) => `${i / 4},1`).join('\n');
    expect(problems(many)).toEqual(['The file has 721 points; at most 720 are kept.']);
  });

  it('gives a short list of many problems', () => {
    const wrong = problems(Array.from({ length: 50 }, () => '400,1').join('\n'));
    expect(wrong).toHaveLength(21);
    expect(wrong.at(-1)).toBe('30 more lines have a problem.');
  });

  it('whatever the text, gives points that the sky takes, or problems', () => {
    const line = fc.oneof(
      fc.string({ maxLength: 12 }),
      fc
        .tuple(fc.integer({ min: -20, max: 400 }), fc.double({ min: -95, max: 95, noNaN: true }))
        .map(([azimuth, elevation]) => `${azimuth},${elevation.toFixed(2)}`),
      fc.constantFrom('# note', '', 'azimuth;elevation', '12;3,4', '\t'),
    );
    fc.assert(
      fc.property(fc.array(line, { maxLength: 8 }), (lines) => {
        const read = parseHorizonCsv(lines.join('\n'));
        expect(read.points.length > 0).toBe(read.problems.length === 0);
        expect(horizonSchema.safeParse(read.points).success).toBe(true);
      }),
    );
  });
});
