import fc from 'fast-check';
import { expect } from 'vitest';
import { HOUR_MS, MINUTE_MS, type Interval } from '../../../../src/domain/time/interval';
import { Conflict, Forbidden, InvalidInput, NotFound } from '../../../../src/server/errors';
import { lapseDueSkeds } from '../../../../src/server/skeds/lapseDueSkeds';
import { moveSked } from '../../../../src/server/skeds/moveSked';
import { removeCrew } from '../../../../src/server/stations/removeCrew';
import { commonWindows, offerFrom, slotIn } from '../world';
import { INVARIANTS } from './invariants';
import { apply, lapse, may, mayMove, move, type Act, type Model, type ModelSked } from './model';
import { act, FLOATERS, join, type Real } from './real';

export const CALL_SIGNS = ['QA1LUN', 'QB7TID', 'QC2FAR'];

type Command = fc.AsyncCommand<Model, Real>;

/** Slots in true common windows, few enough to collide often. */
const SLOTS: Interval[] = commonWindows(CALL_SIGNS)
  .slice(0, 4)
  .flatMap((window) => [0, 20, 45, 75].map((after) => slotIn(window, after, 30)));

/** A step: what should happen by the model, and what did; afterwards everything is looked at. */
abstract class Step implements Command {
  check(model: Readonly<Model>): boolean {
    return this.possible(model);
  }
  async run(model: Model, real: Real): Promise<void> {
    await this.step(model, real);
    for (const invariant of INVARIANTS) await invariant(model, real);
  }
  possible(_model: Readonly<Model>): boolean {
    return true;
  }
  abstract step(model: Model, real: Real): Promise<void>;
  abstract toString(): string;
}

async function refusedOrDone(work: Promise<unknown>): Promise<boolean> {
  try {
    await work;
    return true;
  } catch (error) {
    const forPeople = [Conflict, InvalidInput, NotFound, Forbidden];
    if (!forPeople.some((kind) => error instanceof kind)) throw error;
    return false;
  }
}

class Offer extends Step {
  constructor(
    readonly by: number,
    readonly all: boolean,
    readonly slot: number,
  ) {
    super();
  }
  override possible(model: Readonly<Model>): boolean {
    return model.skeds.length < 6;
  }
  async step(model: Model, real: Real): Promise<void> {
    const by = CALL_SIGNS[this.by]!;
    const others = CALL_SIGNS.filter((callSign) => callSign !== by).slice(0, this.all ? 2 : 1);
    const slot = SLOTS[this.slot % SLOTS.length]!;
    const offering = offerFrom(real.world, by, others, slot).then(({ id }) => real.ids.push(id));
    const done = await refusedOrDone(offering);
    expect(done).toBe(slot.startMs > model.nowMs);
    if (!done) return;
    model.skeds.push({
      ...slot,
      state: 'offered',
      version: 1,
      offeredBy: by,
      answers: new Map([by, ...others].map((one) => [one, one === by ? 'accepted' : 'waiting'])),
      left: new Set(),
    });
  }
  toString = () => `offer(${this.by}, ${this.all ? 'both' : 'one'}, ${this.slot})`;
}

abstract class OnSked extends Step {
  constructor(
    readonly which: number,
    readonly by: number,
  ) {
    super();
  }
  override possible(model: Readonly<Model>): boolean {
    return model.skeds.length > 0;
  }
  /** One of the liked ones, if there is any, so that rare steps find something to do. */
  protected chosen(model: Model, real: Real, liked = (_sked: ModelSked) => true) {
    const all = [...model.skeds.keys()];
    const some = all.filter((place) => liked(model.skeds[place]!));
    const pool = some.length > 0 ? some : all;
    const index = pool[this.which % pool.length]!;
    return { sked: model.skeds[index]!, id: real.ids[index]!, by: CALL_SIGNS[this.by]! };
  }
}

const isOffered = (sked: ModelSked) => sked.state === 'offered';
const isAgreed = (sked: ModelSked) => sked.state === 'agreed';
const LIKED: Record<Act, (sked: ModelSked) => boolean> = {
  accept: isOffered,
  decline: isOffered,
  withdraw: isOffered,
  dropOut: (sked) => (isOffered(sked) || isAgreed(sked)) && sked.answers.size > 2,
  cancel: isAgreed,
  report: isAgreed,
};

class Answer extends OnSked {
  constructor(
    which: number,
    by: number,
    readonly kind: Act,
    readonly staleBy: number,
  ) {
    super(which, by);
  }
  async step(model: Model, real: Real): Promise<void> {
    const { sked, id, by } = this.chosen(model, real, LIKED[this.kind]);
    const allowed = this.staleBy === 0 && may(model, sked, this.kind, by);
    const done = await refusedOrDone(act(real, id, this.kind, by, sked.version - this.staleBy));
    expect(done, `${this.toString()} in state ${sked.state}`).toBe(allowed);
    if (done) apply(sked, this.kind, by);
  }
  toString = () => `${this.kind}(${this.which}, ${this.by}, ${this.staleBy})`;
}

class Move extends OnSked {
  constructor(
    which: number,
    by: number,
    readonly slot: number,
  ) {
    super(which, by);
  }
  async step(model: Model, real: Real): Promise<void> {
    const { sked, id, by } = this.chosen(model, real);
    const slot = SLOTS[this.slot % SLOTS.length]!;
    const allowed = mayMove(model, sked, by, slot);
    const moving = moveSked(real.world.services, real.world.people[by]!, id, {
      version: sked.version,
      words: '',
      start: slot.startMs,
      end: slot.endMs,
    });
    expect(await refusedOrDone(moving), `${this.toString()} in state ${sked.state}`).toBe(allowed);
    if (allowed) move(sked, by, slot);
  }
  toString = () => `move(${this.which}, ${this.by}, ${this.slot})`;
}

class Wait extends Step {
  constructor(readonly minutes: number) {
    super();
  }
  step(model: Model, real: Real): Promise<void> {
    model.nowMs += this.minutes * MINUTE_MS;
    real.world.clock.nowMs = model.nowMs;
    return Promise.resolve();
  }
  toString = () => `wait(${this.minutes})`;
}

/** Until a slot begins or ends, where most rules turn. */
class WaitForSlot extends OnSked {
  step(model: Model, real: Real): Promise<void> {
    const { sked } = this.chosen(model, real, LIKED.cancel);
    const untilMs = [sked.startMs, sked.endMs].find((atMs) => atMs > model.nowMs);
    if (untilMs !== undefined && untilMs - model.nowMs <= 72 * HOUR_MS) {
      model.nowMs = untilMs;
      real.world.clock.nowMs = untilMs;
    }
    return Promise.resolve();
  }
  toString = () => `waitForSlot(${this.which})`;
}

class Lapse extends Step {
  async step(model: Model, real: Real): Promise<void> {
    lapse(model);
    await lapseDueSkeds(real.world.services);
  }
  toString = () => 'lapse';
}

class Crew extends Step {
  constructor(
    readonly who: number,
    readonly station: number,
    readonly joins: boolean,
  ) {
    super();
  }
  override possible(model: Readonly<Model>): boolean {
    return model.crews.get(CALL_SIGNS[this.station]!)!.has(FLOATERS[this.who]!) !== this.joins;
  }
  async step(model: Model, real: Real): Promise<void> {
    const callSign = CALL_SIGNS[this.station]!;
    const name = FLOATERS[this.who]!;
    const person = real.people[name]!;
    if (this.joins) {
      await join(real, person, callSign);
      model.crews.get(callSign)!.add(name);
    } else {
      const stationId = real.world.stationIds[callSign]!;
      await removeCrew(real.world.services, person, stationId, person.id);
      model.crews.get(callSign)!.delete(name);
    }
  }
  toString = () => `${this.joins ? 'joins' : 'leaves'}(${this.who}, ${this.station})`;
}

const which = fc.nat(5);
const station = fc.nat(2);
const slot = fc.nat(SLOTS.length - 1);
const stale = fc.constantFrom(0, 0, 0, 0, 0, 0, 0, 1);
const answer = (kind: Act) =>
  fc.tuple(which, station, stale).map(([sked, by, staleBy]) => new Answer(sked, by, kind, staleBy));

export const commands = fc.commands<Model, Real, false>(
  [
    fc.tuple(station, fc.boolean(), slot).map(([by, all, at]) => new Offer(by, all, at)),
    fc.tuple(station, fc.constant(true), slot).map(([by, all, at]) => new Offer(by, all, at)),
    answer('accept'),
    answer('accept'),
    answer('accept'),
    answer('accept'),
    answer('decline'),
    answer('dropOut'),
    answer('dropOut'),
    answer('withdraw'),
    answer('cancel'),
    answer('report'),
    answer('report'),
    fc.tuple(which, station, slot).map(([sked, by, at]) => new Move(sked, by, at)),
    fc.tuple(which, station, slot).map(([sked, by, at]) => new Move(sked, by, at)),
    fc.constantFrom(1, 30, 240).map((minutes) => new Wait(minutes)),
    fc.tuple(which, station).map(([sked, by]) => new WaitForSlot(sked, by)),
    fc.constant(new Lapse()),
    fc
      .tuple(fc.nat(FLOATERS.length - 1), station, fc.boolean())
      .map(([who, at, joins]) => new Crew(who, at, joins)),
  ],
  { maxCommands: 40, size: 'max' },
);
