import { TRACK_STEPS_S, trackCsv } from '../../domain/sked/trackCsv';
import type { Viewer } from '../auth/viewer';
import { InvalidInput } from '../errors';
import type { Services } from '../services';
import { sheetOf } from './sheetOf';

const DEFAULT_STEP_S = 30;

/**
 * The Moon's track of one party's station through the slot as a file for a rotator's programme; by default the
 * viewer's own station, every 30 s. Throws `NotFound` for people without a part in the sked, `InvalidInput` for
 * another station or step.
 */
export async function skedTrack(
  services: Services,
  viewer: Viewer,
  skedId: string,
  asked: { station: string | null; step: string | null },
): Promise<{ fileName: string; csv: string }> {
  const { stations, own, sked } = await sheetOf(services, viewer, skedId);
  const stepS = TRACK_STEPS_S.find((step) => String(step) === (asked.step ?? `${DEFAULT_STEP_S}`));
  if (stepS === undefined) {
    throw problem('step', 'The step is 10, 30 or 60 seconds.');
  }
  const station =
    asked.station === null ? own : stations.find((party) => party.id === asked.station);
  if (!station) throw problem('station', 'That station has no part in this sked.');
  const day = new Date(sked.startMs).toISOString().slice(0, 16).replaceAll(/[-:]/g, '');
  return {
    fileName: `moon-${station.callSign.toLowerCase().replaceAll(/[^a-z0-9]+/g, '-')}-${day}z.csv`,
    csv: trackCsv(station.site, sked, stepS, sked.frequencyMhz),
  };
}

function problem(path: string, message: string): InvalidInput {
  return new InvalidInput(message, [{ path, message }]);
}
