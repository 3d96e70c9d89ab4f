import { z } from 'zod';
import { hasLapsed, stillIn } from '../../domain/sked/standing';
import { conventionsFor, settingsOpen, type SheetSettings } from '../../domain/sked/sheetSettings';
import { DIAL_CONVENTIONS } from '../../domain/link/doppler';
import type { Viewer } from '../auth/viewer';
import { inTransaction } from '../db/transaction';
import { Conflict, InvalidInput } from '../errors';
import type { Services } from '../services';
import { loadSked, stationIdsOf } from './load';
import { noSuchSked } from './refusals';

const convention = z.enum(DIAL_CONVENTIONS, 'Choose one of the conventions.');

/** JSON body: `eastFirst` as a truth value. */
export const sheetSettingsSchema = z.object({
  eastFirst: z.boolean('Say whether the eastern station transmits first: true or false.'),
  convention,
});

/** The form: who transmits first as `east` or `west`. */
export const sheetSettingsFormSchema = z.object({
  id: z.string().min(1).max(64),
  first: z.enum(['east', 'west'], 'Say who transmits first: the eastern or the western station.'),
  convention,
});

/**
 * Sets what all parties must see alike: who transmits first and how Doppler is corrected. No step of the sked: nothing
 * is answered anew and the calendar entry stays. Throws `NotFound` for people without a part in it, `Conflict` when
 * the sked is over, `InvalidInput` for a convention that tells two stations apart among more.
 */
export async function setSheet(
  services: Services,
  viewer: Viewer,
  skedId: string,
  settings: SheetSettings,
): Promise<SheetSettings> {
  return inTransaction(services.db, async (tx) => {
    const loaded = await loadSked(tx, skedId);
    const mine = await stationIdsOf(tx, viewer.id);
    // Who has dropped out has no hour to come, as in `sheetOf`.
    const parties = stillIn(loaded?.sked.parties ?? []);
    if (!loaded || !parties.some(({ stationId }) => mine.has(stationId))) throw noSuchSked();
    const { state, startMs } = loaded.sked;
    if (!settingsOpen(state) || hasLapsed({ state, startMs }, services.now())) {
      throw new Conflict('This sked will not be worked any more, so its sheet stays as it is.');
    }
    if (!conventionsFor(parties.length).includes(settings.convention)) {
      const message =
        'With more than two stations nobody can correct for one partner alone. Choose another convention.';
      throw new InvalidInput(message, [{ path: 'convention', message }]);
    }
    await tx
      .updateTable('sked')
      .set({
        east_first: settings.eastFirst ? 1 : 0,
        doppler_convention: settings.convention,
      })
      .where('id', '=', skedId)
      .execute();
    return settings;
  });
}
