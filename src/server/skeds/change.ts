import { decide, type Decision, type Sked, type SkedCommand } from '../../domain/sked/machine';
import type { Viewer } from '../auth/viewer';
import { inTransaction, type Tx } from '../db/transaction';
import { Conflict } from '../errors';
import type { Services } from '../services';
import { withAlternatives } from './alternatives';
import { eventSentence, eventsOf } from './events';
import { loadSked, stationIdsOf, type LoadedSked } from './load';
import { notifyDecision } from './notify';
import { noSuchSked, refusalError, SlotTaken } from './refusals';
import { saveDecision } from './save';

export interface ChangeOutcome {
  version: number;
  warnings: string[];
}

export interface Change {
  skedId: string;
  version: number;
  /** On behalf of which station; absent: the viewer's own, the one for which it makes sense first. */
  as?: string | undefined;
  words: string;
  command: (by: string, sked: Sked) => SkedCommand;
  /** Comes before everything else in the transaction; when it throws, nothing is changed. */
  first?: ((tx: Tx) => Promise<void>) | undefined;
  /** Checks beyond the state machine, once it has agreed; returns warnings, throws `SlotTaken`. */
  check?: (tx: Tx, loaded: LoadedSked, next: Sked) => Promise<string[]>;
  /** Further rows to write in the same transaction. */
  also?: (tx: Tx, by: string, next: Sked) => Promise<void>;
}

/**
 * One change to a sked by a member of a party's crew, in one transaction with its mails. Throws
 * `NotFound` for everybody else, `Conflict` when the state forbids it, the version is stale (`details.happened`
 * says what came between) or the slot cannot be had (`details.alternatives`), `InvalidInput` for a wrong slot.
 */
export async function changeSked(
  services: Services,
  viewer: Viewer,
  change: Change,
): Promise<ChangeOutcome> {
  let wanted: { loaded: LoadedSked; next: Sked } | undefined;
  try {
    return await inTransaction(services.db, async (tx) => {
      await change.first?.(tx);
      const loaded = await loadSked(tx, change.skedId);
      const mine = await stationIdsOf(tx, viewer.id);
      const own = (loaded?.sked.parties ?? [])
        .map((party) => party.stationId)
        .filter((id) => mine.has(id));
      if (!loaded || own.length === 0) throw noSuchSked();
      const nowMs = services.now();
      const candidates = change.as === undefined ? own : own.filter((id) => id === change.as);
      if (candidates.length === 0) throw noSuchSked();
      const { decision, by } = firstPossible(candidates, (id) =>
        decide(loaded.sked, change.command(id, loaded.sked), { nowMs }),
      );
      if (!decision.ok) {
        if (decision.refusal.code === 'stale') throw await staleError(tx, loaded, change.version);
        throw refusalError(decision.refusal);
      }
      wanted = { loaded, next: decision.sked };
      const warnings = (await change.check?.(tx, loaded, decision.sked)) ?? [];
      await saveDecision(tx, change.skedId, decision, {
        personId: viewer.id,
        words: change.words,
        atMs: nowMs,
      });
      await change.also?.(tx, by, decision.sked);
      await notifyDecision(tx, services, {
        loaded,
        decision,
        by,
        actor: viewer,
        words: change.words,
      });
      return { version: decision.sked.version, warnings };
    });
  } catch (error) {
    if (!(error instanceof SlotTaken) || !wanted) throw error;
    const { loaded, next } = wanted;
    throw await withAlternatives(services, error, loaded.stations, next, {
      skedId: change.skedId,
      startMs: loaded.sked.startMs,
      endMs: loaded.sked.endMs,
    });
  }
}

/** The first of the viewer's stations for which the command is taken, else the refusal to the first. */
function firstPossible(
  stationIds: readonly string[],
  decideFor: (stationId: string) => Decision,
): { decision: Decision; by: string } {
  const all = stationIds.map((by) => ({ by, decision: decideFor(by) }));
  return all.find(({ decision }) => decision.ok) ?? all[0]!;
}

async function staleError(tx: Tx, loaded: LoadedSked, seenVersion: number): Promise<Conflict> {
  const events = await eventsOf(tx, loaded.row.id);
  const happened = events.filter((event) => event.version > seenVersion).map(eventSentence);
  return new Conflict(
    ['The sked changed since you opened it.', ...happened, 'Nothing was changed by you.'].join(' '),
    { version: loaded.sked.version, happened },
  );
}
