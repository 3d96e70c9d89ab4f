import { decide } from '../../domain/sked/machine';
import { inTransaction } from '../db/transaction';
import type { Services } from '../services';
import { loadSked } from './load';
import { notifyDecision } from './notify';
import { saveDecision } from './save';

/** Writes down, with mails, which offers have lapsed. Returns how many. Each in a transaction of its own. */
export async function lapseDueSkeds(services: Services): Promise<number> {
  const due = await services.db
    .selectFrom('sked')
    .select('id')
    .where('state', '=', 'offered')
    .where('start_at', '<=', services.now())
    .orderBy('start_at')
    .execute();
  let lapsed = 0;
  for (const { id } of due) {
    await inTransaction(services.db, async (tx) => {
      const loaded = await loadSked(tx, id);
      if (!loaded) return;
      const nowMs = services.now();
      const decision = decide(loaded.sked, { kind: 'lapse' }, { nowMs });
      if (!decision.ok) return;
      await saveDecision(tx, id, decision, { personId: null, words: '', atMs: nowMs });
      await notifyDecision(tx, services, { loaded, decision, by: null, actor: null, words: '' });
      lapsed += 1;
    });
  }
  return lapsed;
}
