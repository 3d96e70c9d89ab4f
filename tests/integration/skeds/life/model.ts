import { overlaps, type Interval } from '../../../../src/domain/time/interval';

/** A sked as simply as its rules can be said. */
export interface ModelSked extends Interval {
  state: 'offered' | 'agreed' | 'declined' | 'withdrawn' | 'lapsed' | 'cancelled' | 'reported';
  version: number;
  offeredBy: string;
  /** By call sign, only those still in it. */
  answers: Map<string, 'waiting' | 'accepted' | 'declined'>;
  left: Set<string>;
}

/** What should be true of everything; no line of it is the application's. */
export interface Model {
  nowMs: number;
  skeds: ModelSked[];
  /** Names of people, by call sign. */
  crews: Map<string, Set<string>>;
}

export type Act = 'accept' | 'decline' | 'dropOut' | 'withdraw' | 'cancel' | 'report';

const open = (model: Model, sked: ModelSked) =>
  sked.state === 'offered' && sked.startMs > model.nowMs;

/** Whether no station of the sked is bound elsewhere in its slot. */
function free(model: Model, sked: ModelSked, callSigns: Iterable<string>): boolean {
  return [...callSigns].every(
    (callSign) =>
      !model.skeds.some(
        (other) =>
          other !== sked &&
          (other.state === 'agreed' || other.state === 'reported') &&
          other.answers.has(callSign) &&
          overlaps(other, sked),
      ),
  );
}

const allAccepted = (answers: Iterable<string>) =>
  [...answers].every((answer) => answer === 'accepted');

/** Whether the rules let the station do it now. */
export function may(model: Model, sked: ModelSked, act: Act, by: string): boolean {
  const answer = sked.answers.get(by);
  if (answer === undefined) return false;
  const rest = [...sked.answers].filter(([callSign]) => callSign !== by);
  switch (act) {
    case 'accept':
      return open(model, sked) && answer === 'waiting' && free(model, sked, sked.answers.keys());
    case 'decline':
      return open(model, sked) && sked.offeredBy !== by;
    case 'dropOut': {
      if (rest.length < 2 || sked.endMs <= model.nowMs) return false;
      if (sked.state === 'agreed') return true;
      if (!open(model, sked) || sked.offeredBy === by) return false;
      const agrees = allAccepted(rest.map(([, said]) => said));
      return (
        !agrees ||
        free(
          model,
          sked,
          rest.map(([callSign]) => callSign),
        )
      );
    }
    case 'withdraw':
      return open(model, sked) && sked.offeredBy === by;
    case 'cancel':
      return sked.state === 'agreed' && sked.endMs > model.nowMs;
    case 'report':
      return ['agreed', 'reported'].includes(sked.state) && sked.startMs <= model.nowMs;
  }
}

export function apply(sked: ModelSked, act: Act, by: string): void {
  sked.version += 1;
  const settle = () => {
    if (sked.state === 'offered' && allAccepted(sked.answers.values())) sked.state = 'agreed';
  };
  switch (act) {
    case 'accept':
      sked.answers.set(by, 'accepted');
      return settle();
    case 'dropOut':
      sked.answers.delete(by);
      sked.left.add(by);
      return settle();
    case 'decline':
      sked.answers.set(by, 'declined');
      sked.state = 'declined';
      return;
    case 'withdraw':
      sked.state = 'withdrawn';
      return;
    case 'cancel':
      sked.state = 'cancelled';
      return;
    case 'report':
      sked.state = 'reported';
  }
}

export function mayMove(model: Model, sked: ModelSked, by: string, slot: Interval): boolean {
  if (!sked.answers.has(by) || slot.startMs <= model.nowMs) return false;
  if (sked.state === 'declined') return true;
  const same = slot.startMs === sked.startMs && slot.endMs === sked.endMs;
  const ahead = sked.startMs > model.nowMs;
  return ['offered', 'agreed'].includes(sked.state) && ahead && !same;
}

export function move(sked: ModelSked, by: string, slot: Interval): void {
  Object.assign(sked, slot, { state: 'offered', offeredBy: by, version: sked.version + 1 });
  for (const callSign of sked.answers.keys()) {
    sked.answers.set(callSign, callSign === by ? 'accepted' : 'waiting');
  }
}

export function lapse(model: Model): void {
  for (const sked of model.skeds) {
    if (sked.state === 'offered' && sked.startMs <= model.nowMs) {
      sked.state = 'lapsed';
      sked.version += 1;
    }
  }
}
