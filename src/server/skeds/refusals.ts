import type { Refusal } from '../../domain/sked/machine';
import { Conflict, InvalidInput, NotFound, type AppError } from '../errors';

/** The slot cannot be had; caught by the use case, which adds alternatives. Never leaves src/server/skeds. */
export class SlotTaken extends Error {}

/** A refusal of the state machine as an error for people, except `stale`, which wants what happened since. */
export function refusalError(refusal: Refusal): AppError {
  switch (refusal.code) {
    case 'slot':
      return new InvalidInput(
        refusal.sentence,
        refusal.problems.map(({ field, sentence }) => ({ path: field, message: sentence })),
      );
    case 'notParty':
      return noSuchSked();
    case 'stale':
    case 'state':
    case 'early':
      return new Conflict(refusal.sentence);
  }
}

/** The same whether there is none or the person has no part in it. */
export function noSuchSked(): NotFound {
  return new NotFound('There is no such sked among yours.');
}
