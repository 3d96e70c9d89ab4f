import { bandById } from '../../src/domain/station/bands';
import type { Services } from '../../src/server/services';
import { acceptSked } from '../../src/server/skeds/acceptSked';
import { cancelSked } from '../../src/server/skeds/cancelSked';
import { declineSked } from '../../src/server/skeds/declineSked';
import { lapseDueSkeds } from '../../src/server/skeds/lapseDueSkeds';
import { moveSked } from '../../src/server/skeds/moveSked';
import { offerSked } from '../../src/server/skeds/offerSked';
import { reportSked } from '../../src/server/skeds/reportSked';
import { withdrawSked } from '../../src/server/skeds/withdrawSked';
import type { PlannedSked } from './plan';
import { keeperOf, type Roster } from './roster';

interface Act {
  atMs: number;
  play: (services: Services) => Promise<void>;
}

/**
 * Lives the planned skeds through the use cases of the application, in the order of time and with the clock
 * set to each instant: the rows are those that people would have left behind.
 */
export async function playSkeds(
  services: Services,
  planned: readonly PlannedSked[],
  roster: Roster,
): Promise<void> {
  const acts = planned.flatMap((sked) => actsOf(sked, roster)).sort((a, b) => a.atMs - b.atMs);
  for (const { atMs, play } of acts) await play({ ...services, now: () => atMs });
}

function actsOf({ story, stations, slot, offeredAtMs, steps }: PlannedSked, roster: Roster): Act[] {
  const person = (key: string) => roster.people.get(key)!;
  const ids = stations.map(({ callSign }) => roster.stationIds.get(callSign)!);
  const first = stations[0]!;
  const last = stations.at(-1)!;
  let id = '';
  let version = 0;
  const offer: Act = {
    atMs: offeredAtMs,
    play: async (services) => {
      const outcome = await offerSked(
        services,
        person(story.offeredBy ?? keeperOf(first.callSign).key),
        {
          station: ids[0]!,
          with: ids.slice(1),
          band: story.band,
          frequencyMhz: bandById(story.band).centreMhz,
          mode: story.mode,
          start: slot.startMs,
          end: slot.endMs,
          words: story.words,
        },
      );
      ({ id, version } = outcome);
    },
  };
  return [
    offer,
    ...steps.map(({ step, atMs, slot: moved }): Act => ({
      atMs,
      play: async (services) => {
        if (step.do === 'lapse') {
          await lapseDueSkeds(services);
          return;
        }
        const { callSign } = step.by === 'FIRST' ? first : last;
        const viewer = person(keeperOf(callSign).key);
        const answer = {
          version,
          as: roster.stationIds.get(callSign)!,
          words: step.words ?? '',
        };
        const act = {
          accept: () => acceptSked(services, viewer, id, answer),
          decline: () => declineSked(services, viewer, id, answer),
          withdraw: () => withdrawSked(services, viewer, id, answer),
          cancel: () => cancelSked(services, viewer, id, answer),
          move: () =>
            moveSked(services, viewer, id, { ...answer, start: moved.startMs, end: moved.endMs }),
          report: () =>
            reportSked(services, viewer, id, {
              ...answer,
              result: step.do === 'report' ? step.result : 'completed',
            }),
        }[step.do];
        ({ version } = await act());
      },
    })),
  ];
}
