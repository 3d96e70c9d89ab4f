import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { DAY_MS } from '~/domain/time/interval';
import { acceptSked } from '~/server/skeds/acceptSked';
import { getPublicStation } from '~/server/stations/getStation';
import { loadSearchData } from '~/server/windows/loadSearchData';
import { windowsPage } from '~/server/windows/windowsPage';
import {
  commonWindows,
  giveBand,
  newWorld,
  NOW_MS,
  offerFrom,
  SETUP,
  setSky,
  slotIn,
  type World,
} from '../skeds/world';

const SPAN = { startMs: NOW_MS, endMs: NOW_MS + 30 * DAY_MS };
const A = 'QA1LUN';
const B = 'QB7TID';
const C = 'QC2FAR';

let world: World;
beforeEach(async () => {
  world = await newWorld();
});
afterEach(() => world.close());

const load = (who: string | null, tokens: string[]) =>
  loadSearchData(world.services, who === null ? null : world.people[who]!, tokens, SPAN);

describe('stations of a question', () => {
  it('are found by call sign in any case, by id, and as places by locator', async () => {
    const { stations, problems } = await load(null, [
      'qa1lun',
      world.stationIds[B]!,
      'fn43EV@America/New_York',
    ]);
    expect(problems).toEqual([]);
    expect(stations.map(({ callSign, id, timeZone }) => [callSign, id === null, timeZone])).toEqual(
      [
        [A, false, 'Europe/Stockholm'],
        [B, false, 'America/New_York'],
        ['FN43ev', true, 'America/New_York'],
      ],
    );
  });

  it('are left out with a sentence each when they cannot be found', async () => {
    const { stations, problems } = await load(null, [A, 'QZ0NOT', 'JO97ee@Moon/Tycho', 'qa1lun']);
    expect(stations.map((station) => station.callSign)).toEqual([A]);
    expect(problems.map((problem) => problem.sentence)).toEqual([
      'There is no listed station “QZ0NOT”, and it is not a locator such as JO97ee.',
      '“Moon/Tycho” is not a time zone such as Europe/Stockholm.',
      'QA1LUN is named twice. Each station counts once.',
    ]);
  });

  it('stay hidden from all but their crew when they are not listed', async () => {
    await world.services.db
      .updateTable('station')
      .set({ listed: 0 })
      .where('id', '=', world.stationIds[B]!)
      .execute();
    expect((await load(A, [B])).stations).toEqual([]);
    expect((await load(null, [world.stationIds[B]!])).stations).toEqual([]);
    expect((await load(B, [B])).stations[0]).toMatchObject({ callSign: B, own: true });
  });

  it('are exact for their crew, and only the public locator for others', async () => {
    const own = (await load(A, [A])).stations[0]!;
    expect(own).toMatchObject({ own: true, site: { latitudeDeg: 57.19, longitudeDeg: 18.38 } });
    const foreign = (await load(B, [A])).stations[0]!;
    expect(foreign).toMatchObject({ own: false, locator: 'JO97', site: { heightM: 0 } });
    expect(foreign.site).toMatchObject({ latitudeDeg: 57.5, longitudeDeg: 19 });
  });

  it('carry their equipment, which is on their public page too; bare places have none', async () => {
    await giveBand(world, A, SETUP);
    const { stations } = await load(null, [A, B, 'JO97ee']);
    expect(stations.map(({ equipment }) => equipment)).toEqual([
      [{ band: '1296', setup: SETUP }],
      [],
      [],
    ]);
    const { station } = await getPublicStation(world.services, null, world.stationIds[A]!);
    expect(station.equipment).toEqual(stations[0]!.equipment);
  });

  it('do not tell visitors the names of blocked sectors', async () => {
    await setSky(world.services, world.stationIds[A]!, {
      blocked: [
        {
          azimuthFromDeg: 101,
          azimuthToDeg: 119,
          elevationFromDeg: 0,
          elevationToDeg: 18,
          name: 'barn',
        },
      ],
    });
    expect(JSON.stringify(await load(null, [A]))).not.toContain('barn');
    expect(JSON.stringify(await load(B, [A]))).toContain('barn');
  });
});

describe('skeds of the stations', () => {
  it('show offers to their parties only, and who the partner is to nobody else', async () => {
    const slot = slotIn(commonWindows([A, B])[0]!, 5);
    const { id, version } = await offerFrom(world, A, [B], slot);
    expect((await load(A, [A, C])).taken).toEqual([
      { ...slot, state: 'offered', callSigns: [A], skedId: id, partner: B },
    ]);
    expect((await load(C, [A, C])).taken).toEqual([]);
    expect((await load(null, [A])).taken).toEqual([]);

    await acceptSked(world.services, world.people[B]!, id, { version, words: '' });
    expect((await load(C, [A, C])).taken).toEqual([
      { ...slot, state: 'agreed', callSigns: [A], skedId: null, partner: null },
    ]);
    expect((await load(C, [C])).taken).toEqual([]);
  });
});

describe('the windows page', () => {
  it('judges by margin when both stations have equipment, else by degradation with the reason', async () => {
    const page = () =>
      windowsPage(world.services, null, new URLSearchParams(`station=${A}&station=${B}`));
    await giveBand(world, A, SETUP);
    expect((await page()).layers!.judge).toMatchObject({
      basis: 'degradation',
      sentence:
        'Judged by degradation, the path alone: no equipment on 1296 MHz is known of QB7TID.',
    });
    await giveBand(world, B, SETUP);
    const { layers } = await page();
    expect(layers!.judge.basis).toBe('margin');
    expect(layers!.windowQuality.every(({ basis }) => basis === 'margin')).toBe(true);
  });

  it('puts the viewer’s own station in when none is named', async () => {
    const page = await windowsPage(world.services, world.people[A]!, new URLSearchParams());
    expect(page.question.stations).toEqual([A]);
    expect(page.layers).toBeNull();
  });

  it('keeps each lowest elevation with its station when one before it cannot be found', async () => {
    const params = new URLSearchParams(
      `station=QZ0NOT&station=${A}&station=${B}&low=5&low=7&low=9`,
    );
    const page = await windowsPage(world.services, null, params);
    expect(page.question.stations).toEqual([A, B]);
    expect(page.question.lowestDeg).toEqual([7, 9]);
    expect(page.problems).toHaveLength(1);
    expect(page.layers!.windows.length).toBeGreaterThan(0);
  });
});
