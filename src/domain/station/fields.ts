import { z } from 'zod';
import { formatNumber } from '../time/format';

/** A number of a form, with sentences that name it: "Height must be at least −450 m." */
export function figure(what: string, least: number, most: number, unit = '') {
  const shown = (value: number) => `${bare(value)}${unit === '' || unit === '°' ? '' : ' '}${unit}`;
  return z
    .number({
      error: (issue) =>
        issue.input === undefined ? `${what} is missing.` : `${what} must be a number.`,
    })
    .min(least, `${what} must be at least ${shown(least)}.`)
    .max(most, `${what} must be at most ${shown(most)}.`);
}

function bare(value: number): string {
  const decimals = String(value).split('.')[1]?.length ?? 0;
  return formatNumber(value, decimals);
}

/** Text without spaces around it. */
export function words(what: string, most: number, least = 0) {
  const text = z
    .string({
      error: (issue) =>
        issue.input === undefined ? `${what} is missing.` : `${what} must be text.`,
    })
    .trim()
    .max(most, `${what} must be at most ${most} characters long.`);
  return least > 0 ? text.min(least, `${what} is missing.`) : text;
}

/** An object that refuses fields it does not know, by name. */
export function record<T extends z.core.$ZodLooseShape>(shape: T, what = 'The input') {
  return z.strictObject(shape, {
    error: (issue) =>
      issue.code === 'unrecognized_keys'
        ? `There is no field ${issue.keys.map((key) => `“${key}”`).join(', ')} here.`
        : `${what} must be an object with named fields.`,
  });
}

/** The version of a record that the editor has seen; a stale one is refused on saving. */
export const versionSchema = z
  .number({ error: 'The version you edited is missing. Reload the page.' })
  .int('The version must be a whole number.')
  .min(1, 'The version must be at least 1.');
