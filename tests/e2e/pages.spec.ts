import { readdirSync } from 'node:fs';
import path from 'node:path';
import type { Browser } from '@playwright/test';
import { paths } from '../../src/paths';
import { pageAs } from './support/people';
import type { RunningServer } from './support/server';
import { expect, test } from './support/test';
import { axeViolations, hydrated, sidewaysOverflow, watchPage } from './support/watch';

type Who = Parameters<typeof pageAs>[2];
type Ids = Record<'QA1LUN' | 'QB7TID' | 'offered' | 'agreed' | 'reported', string>;

interface Checked {
  /** File of the route below src/pages, without its ending. */
  route: string;
  address: (ids: Ids) => string;
  as: Who[];
  status?: number;
}

/** Address of the activity of the demo. */
const DEMO = 'two-tides-weekend';

const everybody: Who[] = [null, 'Ylva'];
const forPeople: Who[] = ['Ylva', 'Marit'];

const PAGES: Checked[] = [
  { route: 'index', address: () => paths.home, as: [null, 'Ylva', 'Marit', 'Osvin'] },
  { route: 'register', address: () => paths.register, as: [null] },
  { route: 'registered', address: () => paths.registered, as: [null] },
  { route: 'sign-in/index', address: () => paths.signIn, as: [null] },
  { route: 'sign-in/link/index', address: () => paths.signInLink, as: [null] },
  {
    route: 'sign-in/link/[secret]',
    address: () => paths.useSignInLink('none'),
    as: [null],
    status: 404,
  },
  { route: 'forgotten', address: () => paths.forgotten, as: [null] },
  { route: 'confirm/[secret]', address: () => paths.confirmMail('none'), as: [null], status: 404 },
  { route: 'reset/[secret]', address: () => paths.resetPassword('none'), as: [null], status: 404 },
  { route: 'join/[secret]', address: () => paths.joinCrew('none'), as: ['Ylva'], status: 404 },
  { route: 'account', address: () => paths.account, as: ['Ylva', 'Osvin'] },
  { route: 'account/mail', address: () => paths.accountMail, as: ['Ylva'] },
  {
    route: 'unsubscribe/[token]',
    address: () => paths.unsubscribe('none'),
    as: [null],
    status: 404,
  },
  {
    route: 'windows',
    address: () => paths.windowsWith(['QA1LUN', 'QB7TID'], '1296'),
    as: everybody,
  },
  { route: 'windows', address: () => paths.windows, as: everybody },
  { route: 'outlook', address: () => paths.outlook, as: everybody },
  {
    route: 'outlook',
    address: () => paths.outlookBetween('QA1LUN', 'QB7TID', '1296'),
    as: [null],
  },
  { route: 'skeds/index', address: () => paths.skeds, as: forPeople },
  { route: 'skeds/[id]/index', address: (ids) => paths.sked(ids.offered), as: ['Ylva'] },
  { route: 'skeds/[id]/index', address: (ids) => paths.sked(ids.agreed), as: ['Ylva'] },
  { route: 'skeds/[id]/index', address: (ids) => paths.sked(ids.reported), as: ['Ylva'] },
  {
    route: 'skeds/[id]/[step]',
    address: (ids) => paths.skedStep(ids.offered, 'decline'),
    as: ['Ylva'],
  },
  { route: 'skeds/[id]/sheet', address: (ids) => paths.skedSheet(ids.agreed), as: ['Ylva'] },
  { route: 'skeds/[id]/sheet', address: (ids) => paths.skedSheet(ids.reported), as: ['Ylva'] },
  { route: 'skeds/[id]/live', address: (ids) => paths.skedLive(ids.agreed), as: ['Ylva'] },
  { route: 'skeds/[id]/live', address: (ids) => paths.skedLive(ids.reported), as: ['Ylva'] },
  { route: 'skeds/[id]/move', address: (ids) => paths.skedMove(ids.offered), as: ['Ylva'] },
  { route: 'skeds/new-guest', address: () => paths.newGuest, as: forPeople },
  { route: 'answer/[secret]/index', address: () => paths.answer('none'), as: [null], status: 404 },
  {
    route: 'answer/[secret]/move',
    address: () => paths.answerMove('none'),
    as: [null],
    status: 404,
  },
  { route: 'no-more/[token]', address: () => paths.noMore('none'), as: [null], status: 404 },
  { route: 'calendar', address: () => paths.calendar, as: forPeople },
  { route: 'activities/index', address: () => paths.activities, as: [null, 'Ylva', 'Marit'] },
  { route: 'activities/new', address: () => paths.newActivity, as: ['Marit'] },
  { route: 'activities/new', address: () => paths.newActivity, as: ['Ylva'], status: 403 },
  { route: 'activities/[slug]/index', address: () => paths.activity(DEMO), as: ['Ylva', 'Marit'] },
  {
    route: 'activities/[slug]/index',
    address: () => paths.activity(DEMO),
    as: [null],
    status: 404,
  },
  { route: 'activities/[slug]/roster', address: () => paths.activityRoster(DEMO), as: ['Marit'] },
  {
    route: 'activities/[slug]/roster',
    address: () => `${paths.activityRoster(DEMO)}?find=q`,
    as: ['Osvin'],
  },
  { route: 'activities/[slug]/import', address: () => paths.activityImport(DEMO), as: ['Marit'] },
  { route: 'activities/[slug]/wishes', address: () => paths.activityWishes(DEMO), as: ['Marit'] },
  { route: 'activities/[slug]/plan', address: () => paths.activityPlan(DEMO), as: ['Marit'] },
  {
    route: 'activities/[slug]/timetable',
    address: () => paths.activityTimetable(DEMO),
    as: ['Marit'],
  },
  { route: 'activities/[slug]/publish', address: () => paths.activityPublish(DEMO), as: ['Marit'] },
  // plan.spec.ts looks at them with a plan in them.
  {
    route: 'activities/[slug]/stations/[callSign]/index',
    address: () => paths.activityStation(DEMO, 'QA1LUN'),
    as: ['Ylva'],
    status: 404,
  },
  {
    route: 'activities/[slug]/revisions/[number]',
    address: () => paths.activityRevision(DEMO, 1),
    as: ['Ylva'],
    status: 404,
  },
  {
    route: 'activities/[slug]/settings',
    address: () => paths.activitySettings(DEMO),
    as: ['Marit'],
  },
  { route: 'activities/[slug]/answer', address: () => paths.activityAnswer(DEMO), as: ['Ylva'] },
  {
    route: 'activities/[slug]/answer',
    address: (ids) => paths.activityAnswer(DEMO, ids.QB7TID),
    as: ['Marit'],
  },
  {
    route: 'roster/[secret]',
    address: () => paths.rosterAnswer('none'),
    as: [null],
    status: 404,
  },
  { route: 'stations/index', address: () => paths.stations, as: everybody },
  { route: 'stations/new', address: () => paths.newStation, as: ['Ylva'] },
  {
    route: 'stations/[id]/index',
    address: (ids) => paths.station(ids.QA1LUN),
    as: [null, 'Ylva', 'Edda'],
  },
  { route: 'stations/[id]/place', address: (ids) => paths.stationPlace(ids.QA1LUN), as: ['Ylva'] },
  { route: 'stations/[id]/sky', address: (ids) => paths.stationSky(ids.QA1LUN), as: ['Ylva'] },
  {
    route: 'stations/[id]/equipment',
    address: (ids) => paths.stationEquipment(ids.QA1LUN),
    as: ['Ylva'],
  },
  { route: 'stations/[id]/hours', address: (ids) => paths.stationHours(ids.QA1LUN), as: ['Ylva'] },
  { route: 'stations/[id]/crew', address: (ids) => paths.stationCrew(ids.QA1LUN), as: ['Ylva'] },
  {
    route: 'stations/[id]/profile',
    address: (ids) => paths.stationProfile(ids.QA1LUN),
    as: ['Ylva'],
  },
  { route: 'admin/people', address: () => paths.people, as: ['Osvin'] },
  { route: 'method', address: () => paths.method, as: everybody },
  ...['first-sked', 'sky-limits', 'mail-and-calendar', 'words', 'cautions'].map(
    (slug): Checked => ({ route: 'help/[slug]', address: () => paths.help(slug), as: [null] }),
  ),
  { route: 'help/[slug]', address: () => paths.help('none'), as: [null], status: 404 },
  { route: '404', address: () => '/nothing-is-here', as: everybody, status: 404 },
  { route: '403', address: () => paths.people, as: ['Ylva'], status: 403 },
];

/** Routes that only ever show what another page failed with. */
const SHOWN_BY_OTHERS = ['problem', '500'];

for (const { route, address, as, status = 200 } of PAGES) {
  for (const who of as) {
    const name = `${address(placeholders())} for ${who ?? 'a visitor'}`;
    test(name, async ({ demo, browser }) => {
      const ids = await readIds(browser, demo);
      const page = await pageAs(browser, demo, who, { colorScheme: 'light' });
      const { complaints } = watchPage(page);
      const response = await page.goto(demo.url + address(ids));
      expect(response?.status(), route).toBe(status);
      await hydrated(page);
      await expect(page.getByRole('heading', { level: 1 })).toHaveCount(1);
      await expect(page).toHaveTitle(/\S · Echotide$/);

      for (const width of [1440, 390]) {
        await page.setViewportSize({ width, height: 900 });
        for (const colorScheme of ['light', 'dark'] as const) {
          await page.emulateMedia({ colorScheme, reducedMotion: 'reduce' });
          const violations = await axeViolations(page, { coloursOnly: colorScheme === 'dark' });
          expect.soft(violations, `axe, ${width} px, ${colorScheme}`).toEqual([]);
        }
        expect.soft(await sidewaysOverflow(page), `${width} px`).toEqual([]);
      }
      await page.setViewportSize({ width: 360, height: 740 });
      expect.soft(await sidewaysOverflow(page), '360 px').toEqual([]);
      const expected =
        status === 200 ? [] : [new RegExp(`the server responded with a status of ${status}`)];
      expect(complaints.filter((text) => !expected.some((known) => known.test(text)))).toEqual([]);
      await page.context().close();
    });
  }
}

test('every page of the application is looked at here', () => {
  const folder = path.resolve('src/pages');
  const routes = readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((file) => file.endsWith('.astro'))
    .map((file) => file.replaceAll('\\', '/').replace(/\.astro$/, ''));
  const looked = new Set(PAGES.map((page) => page.route));
  expect(routes.filter((route) => !looked.has(route) && !SHOWN_BY_OTHERS.includes(route))).toEqual(
    [],
  );
});

const known = new Map<string, Promise<Ids>>();

/** Ids of two stations of the demo, and of an offer that waits for Ylva, an agreed and a reported sked of hers. */
function readIds(browser: Browser, server: RunningServer): Promise<Ids> {
  const found = known.get(server.url) ?? askForIds(browser, server);
  known.set(server.url, found);
  return found;
}

async function askForIds(browser: Browser, server: RunningServer): Promise<Ids> {
  const page = await pageAs(browser, server, 'Ylva');
  const get = async (address: string) => (await page.request.get(server.url + address)).json();
  const { stations } = (await get(paths.api.stations)) as {
    stations: { id: string; callSign: string }[];
  };
  interface Row {
    id: string;
    state: string;
    waitsForViewer: boolean;
  }
  const coming = ((await get(paths.api.skeds)) as { skeds: Row[] }).skeds;
  const past = ((await get(`${paths.api.skeds}?when=past`)) as { skeds: Row[] }).skeds;
  await page.context().close();
  const station = (callSign: string) => stations.find((one) => one.callSign === callSign)!.id;
  const sked = (wanted: (sked: Row) => boolean) => [...coming, ...past].find(wanted)!.id;
  return {
    QA1LUN: station('QA1LUN'),
    QB7TID: station('QB7TID'),
    offered: sked(({ waitsForViewer }) => waitsForViewer),
    agreed: sked(({ state }) => state === 'agreed'),
    reported: sked(({ state }) => state === 'reported'),
  };
}

/** For the names of the tests, which are known before any server runs. */
function placeholders(): Ids {
  return {
    QA1LUN: 'QA1LUN',
    QB7TID: 'QB7TID',
    offered: 'offered',
    agreed: 'agreed',
    reported: 'reported',
  };
}
