import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { safeReturnPath, signInPath } from '~/server/http/returnPath';

describe('safeReturnPath', () => {
  it.each([
    ['/skeds', '/skeds'],
    ['/skeds/7?tab=sheet#track', '/skeds/7?tab=sheet#track'],
    ['/windows?station=a&station=b', '/windows?station=a&station=b'],
    ['/a/../account', '/account'],
    ['/sign-in-sheet', '/sign-in-sheet'],
  ])('keeps %s', (given, kept) => {
    expect(safeReturnPath(given)).toBe(kept);
  });

  it.each([
    undefined,
    null,
    '',
    'skeds',
    'https://elsewhere.example/',
    '//elsewhere.example',
    '///elsewhere.example',
    '/\\elsewhere.example',
    '\\\\elsewhere.example',
    '/.//elsewhere.example',
    '/a/..//elsewhere.example',
    '/\t/elsewhere.example',
    '/\n/elsewhere.example',
    'javascript:alert(1)',
    '/sign-in',
    '/sign-in?next=/sign-in',
    '/sign-in/link/abc',
    `/${'a'.repeat(2000)}`,
  ])('refuses %j', (given) => {
    expect(safeReturnPath(given)).toBeUndefined();
  });

  it('never leads to another host, whatever is given', () => {
    const piece = fc.constantFrom(
      '/',
      '\\',
      '.',
      '..',
      ':',
      '@',
      'x',
      '?',
      '#',
      '\t',
      '%2f',
      'https:',
    );
    fc.assert(
      fc.property(fc.array(piece, { maxLength: 12 }), (pieces) => {
        const kept = safeReturnPath(pieces.join(''));
        if (kept === undefined) return;
        const led = new URL(kept, 'https://echotide.example/sign-in');
        expect(led.origin).toBe('https://echotide.example');
      }),
      { numRuns: 3000 },
    );
  });
});

describe('signInPath', () => {
  it('carries a safe way back', () => {
    expect(signInPath('/skeds?a=1&b=2')).toBe('/sign-in?next=%2Fskeds%3Fa%3D1%26b%3D2');
    expect(signInPath('//elsewhere.example')).toBe('/sign-in');
    expect(signInPath('/')).toBe('/sign-in');
  });
});
