import { z } from 'zod';
import { DAY_MS } from '../time/interval';

export const LONGEST_MESSAGE = 1000;
/** After the slot's end the parties can still write to each other for so long. */
export const TALK_OPEN_MS = 30 * DAY_MS;

/** A short message between the parties of a sked, as its crews read it. */
export interface TalkMessage {
  id: string;
  callSign: string;
  personName: string;
  byViewer: boolean;
  words: string;
  atMs: number;
}

/** What a crew member sees of the talk. `as`: the viewer's station that can write now, or null. */
export interface TalkView {
  messages: TalkMessage[];
  as: string | null;
  openUntilMs: number;
}

/**
 * Text as it can stand anywhere: line breaks are one character, other control characters and marks that turn the
 * direction of what follows are gone, and empty lines are not piled up.
 */
export function plainWords(text: string): string {
  return text
    .replace(/\r\n?|[\u2028\u2029]/g, '\n')
    .replace(/(?!\n)\p{Cc}|[\u202a-\u202e\u2066-\u2069\ufeff]/gu, ' ')
    .replace(/[^\S\n]+\n/g, '\n')
    .replace(/\n{3,}/g, '\n\n')
    .trim();
}

export const messageWordsSchema = z
  .string('The message must be text.')
  .max(LONGEST_MESSAGE * 4, `Keep the message under ${LONGEST_MESSAGE} characters.`)
  .transform(plainWords)
  .refine((words) => words.length > 0, 'Write something first.')
  .refine(
    (words) => [...words].length <= LONGEST_MESSAGE,
    `Keep the message under ${LONGEST_MESSAGE} characters.`,
  );
