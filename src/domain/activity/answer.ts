import { z } from 'zod';
import { BAND_IDS, type BandId } from '../station/bands';
import { words } from '../station/fields';
import type { Interval } from '../time/interval';
import { intervalsOfHours } from './hours';
import type { PlanPriority } from './plan/types';
import type { WishKind } from './wishes';

export const ANSWERS = ['coming', 'notComing'] as const;

/** What a station answers. */
export interface StationAnswer {
  answer: (typeof ANSWERS)[number];
  bands: BandId[];
  /** Null: its usable hours. */
  hours: Interval[] | null;
  mostContacts: number | null;
  wants: 'everyone' | 'list';
  priority: PlanPriority;
  wishes: { partnerId: string; kind: WishKind; priority: PlanPriority }[];
  note: string;
}

const priorityOf = (text: unknown): PlanPriority => (text === '3' ? 3 : text === '1' ? 1 : 2);

/** What stands beside each partner: nothing, a priority, or never. */
const wishChoice = z.enum(['', '1', '2', '3', 'never'], {
  error: 'Of each station choose one of the answers in the list.',
});

const formSchema = z.object({
  answer: z.enum(ANSWERS, { error: 'Say whether you are coming.' }),
  bands: z.partialRecord(z.enum(BAND_IDS), z.literal('yes')).default({}),
  when: z.enum(['usual', 'these'], { error: 'Say at what hours.' }).default('usual'),
  hour: z.record(z.string().regex(/^\d{1,4}$/), z.literal('yes')).default({}),
  mostContacts: z
    .string()
    .trim()
    .refine(
      (text) => text === '' || (/^\d{1,3}$/.test(text) && Number(text) >= 1),
      'Most contacts must be a whole number from 1 to 999, or nothing.',
    )
    .transform((text) => (text === '' ? null : Number(text)))
    .default(null),
  wants: z.enum(['everyone', 'list'], { error: 'Say whom you want.' }).default('everyone'),
  priority: z.enum(['1', '2', '3']).default('2').transform(priorityOf),
  wish: z.record(z.string(), wishChoice).default({}),
  note: words('The note', 1000).default(''),
});

/** An answer from the nested fields of a form, for an activity of this span. */
export function answerSchema(span: Interval, offered: readonly BandId[]) {
  return formSchema
    .transform((given): StationAnswer => {
      const chosen = new Set(Object.keys(given.hour).map(Number));
      return {
        answer: given.answer,
        bands: offered.filter((band) => given.bands[band] === 'yes'),
        hours: given.when === 'these' ? intervalsOfHours(span, chosen) : null,
        mostContacts: given.mostContacts,
        wants: given.wants,
        priority: given.priority,
        wishes: Object.entries(given.wish)
          .filter(([, choice]) => choice !== '')
          .map(([partnerId, choice]) =>
            choice === 'never'
              ? { partnerId, kind: 'never', priority: 2 }
              : { partnerId, kind: 'want', priority: priorityOf(choice) },
          ),
        note: given.note,
      };
    })
    .superRefine((answer, context) => {
      if (answer.answer !== 'coming') return;
      if (answer.bands.length === 0) {
        context.addIssue({
          code: 'custom',
          path: ['bands'],
          message: 'Choose at least one band on which you will be there.',
        });
      }
      if (answer.hours?.length === 0) {
        context.addIssue({
          code: 'custom',
          path: ['hour'],
          message: 'Choose at least one hour, or your usable hours.',
        });
      }
      if (answer.wants === 'list' && !answer.wishes.some(({ kind }) => kind === 'want')) {
        context.addIssue({
          code: 'custom',
          path: ['wants'],
          message: 'Name at least one station that you want, or choose everyone.',
        });
      }
    });
}
