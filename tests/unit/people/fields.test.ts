import { describe, expect, it } from 'vitest';
import { emailField, nameField, passwordField, timeZoneField } from '~/server/people/fields';

const message = (result: { error?: { issues: { message: string }[] } | undefined }) =>
  result.error?.issues[0]?.message;

describe('mail address', () => {
  it('is taken in lower case', () => {
    expect(emailField.parse('  Ylva@QA1LUN.Example ')).toBe('ylva@qa1lun.example');
    expect(emailField.parse("o'hara+eme@sub.station.example")).toBe(
      "o'hara+eme@sub.station.example",
    );
  });

  it.each([
    '',
    'ylva',
    'ylva@station',
    'ylva@@station.example',
    'ylva@station.example,edda@station.example',
    'ylva@station.example\r\nBcc: edda@station.example',
    'ylva@station.example\nx',
    '"ylva"@station.example',
    'Ylva <ylva@station.example>',
    'ylva @station.example',
    'ylva@-station.example',
    `${'a'.repeat(65)}@station.example`,
    `a@${'b.'.repeat(130)}example`,
  ])('%j is refused', (given) => {
    expect(emailField.safeParse(given).success).toBe(false);
  });

  it('is refused in a sentence', () => {
    expect(message(emailField.safeParse(undefined))).toBe('Enter your mail address.');
    expect(message(emailField.safeParse('ylva'))).toMatch(/^That is not a mail address/);
  });
});

describe('name', () => {
  it('is one line', () => {
    expect(nameField.parse(' Ylva \n of the  barn ')).toBe('Ylva of the barn');
    expect(nameField.parse('Šárka Ødegård')).toBe('Šárka Ødegård');
  });
  it.each(['', '   ', 'a'.repeat(81), 'Ylva\u0000', 'Ylva\u202e', '<b>Ylva</b>'])(
    '%j is refused',
    (given) => {
      expect(nameField.safeParse(given).success).toBe(false);
    },
  );
});

describe('password', () => {
  it('needs length only', () => {
    expect(passwordField.safeParse('         .').success).toBe(true);
    expect(message(passwordField.safeParse('ninechars'))).toBe(
      'A password needs at least 10 characters.',
    );
    expect(passwordField.safeParse('a'.repeat(201)).success).toBe(false);
  });
  it.each(['Password123', '1234567890', 'QWERTYUIOP', 'moonbounce'])(
    '%s is too common',
    (given) => {
      expect(message(passwordField.safeParse(given))).toMatch(/first that anybody would try/);
    },
  );
});

describe('time zone', () => {
  it.each(['UTC', 'Europe/Berlin', 'Asia/Kathmandu'])('%s is one', (zone) => {
    expect(timeZoneField.parse(zone)).toBe(zone);
  });
  it.each(['', 'Moon/Copernicus', '+02:00', 'Europe/Berlin; --'])('%j is none', (zone) => {
    expect(timeZoneField.safeParse(zone).success).toBe(false);
  });
});
