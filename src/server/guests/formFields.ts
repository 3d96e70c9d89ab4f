import { z } from 'zod';
import type { SkyLimits } from '../../domain/sky/limits';

/** A field of a form that may stay empty: degrees with a point or a comma. */
export function degreesField(what: string, least: number, most: number) {
  return numberField(what, least, most, '°');
}

/** A number of a form that may stay empty. */
export function numberField(what: string, least: number, most: number, unit: string) {
  const shown = (value: number) => `${value}${unit === '°' ? '' : ' '}${unit}`;
  return z
    .string()
    .default('')
    .transform((text, context): number | undefined => {
      const trimmed = text.trim().replace(',', '.');
      if (trimmed === '') return undefined;
      const value = /^\d{1,6}(\.\d{1,3})?$/.test(trimmed) ? Number(trimmed) : NaN;
      if (value >= least && value <= most) return value;
      context.addIssue({
        code: 'custom',
        message: `${what} must be a number from ${shown(least)} to ${shown(most)}, or stay empty.`,
      });
      return z.NEVER;
    });
}

/** A time of the day as people type it, "8", "8:00" or "0800", written as "08:00". */
export function clockField(what: string, lastHour: 23 | 24) {
  return z
    .string()
    .default('')
    .transform((text, context): string => {
      const match = /^(\d{1,2})(?::?([0-5]\d))?$/.exec(text.trim());
      const hour = match ? Number(match[1]) : NaN;
      const minute = match?.[2] ?? '00';
      if (hour < 24 || (hour === 24 && lastHour === 24 && minute === '00')) {
        return `${String(hour).padStart(2, '0')}:${minute}`;
      }
      context.addIssue({
        code: 'custom',
        message: `${what} must be a time such as ${lastHour === 24 ? '23:00, at most 24:00' : '08:00'}.`,
      });
      return z.NEVER;
    });
}

/** The ranges of a form as limits of the sky. */
export function skyRanges(ranges: {
  elevationFrom?: number | undefined;
  elevationTo?: number | undefined;
  azimuthFrom?: number | undefined;
  azimuthTo?: number | undefined;
}): SkyLimits {
  const { elevationFrom, elevationTo, azimuthFrom, azimuthTo } = ranges;
  return {
    ...(elevationFrom === undefined ? {} : { elevationFromDeg: elevationFrom }),
    ...(elevationTo === undefined ? {} : { elevationToDeg: elevationTo }),
    ...(azimuthFrom === undefined ? {} : { azimuthFromDeg: azimuthFrom }),
    ...(azimuthTo === undefined ? {} : { azimuthToDeg: azimuthTo }),
  };
}
