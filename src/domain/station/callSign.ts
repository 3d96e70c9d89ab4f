import { z } from 'zod';

/** Prefix with a letter, at least one digit, a suffix that ends in a letter: QA1LUN, Q9ZZ. */
const CORE = /^(?:[A-Z]{1,3}|[A-Z][0-9]|[0-9][A-Z]{1,2})[0-9][A-Z0-9]*[A-Z]$/;

/** What is wrong with the call sign, as a sentence; null when nothing is. Expects capitals. */
export function callSignProblem(callSign: string): string | null {
  if (callSign === '') return 'A call sign is needed.';
  const strange = [...callSign].find((character) => !/[A-Z0-9/]/.test(character));
  if (strange !== undefined) {
    const shown = strange === ' ' ? 'a space' : `“${strange}”`;
    return `A call sign has only letters A to Z, digits and slashes; ${shown} does not belong in it.`;
  }
  if (callSign.length < 3) return 'A call sign has at least 3 characters.';
  if (callSign.length > 12) return 'A call sign has at most 12 characters.';
  const parts = callSign.split('/');
  if (parts.length > 3 || parts.some((part) => part === '')) {
    return 'A slash stands between two parts of a call sign, at most twice.';
  }
  if (!parts.some((part) => CORE.test(part))) {
    return 'A call sign has a prefix, a digit and letters at its end, such as QA1LUN.';
  }
  return null;
}

/** Letters are made capitals, spaces around are dropped. */
export const callSignSchema = z
  .string({ error: 'A call sign is needed.' })
  .transform((text) => text.trim().toUpperCase())
  .superRefine((callSign, context) => {
    const message = callSignProblem(callSign);
    if (message) context.addIssue({ code: 'custom', message });
  });
