import { test as base } from '@playwright/test';
import { startServer, type RunningServer } from './server';

export { expect, type Page, type Browser, type BrowserContext } from '@playwright/test';

interface Servers {
  /** With the demo scenario; shared by the tests of one worker, so they leave it as they found it. */
  demo: RunningServer;
  /** With an empty database; shared as well, so every test uses names of its own. */
  empty: RunningServer;
}

export const test = base.extend<object, Servers>({
  demo: [
    // Playwright reads from the pattern which fixtures are wanted: none.
    // eslint-disable-next-line no-empty-pattern
    async ({}, use) => {
      const server = await startServer({ demo: true });
      await use(server);
      await server.stop();
    },
    { scope: 'worker', timeout: 60_000 },
  ],
  empty: [
    // Playwright reads from the pattern which fixtures are wanted: none.
    // eslint-disable-next-line no-empty-pattern
    async ({}, use) => {
      const server = await startServer({ demo: false });
      await use(server);
      await server.stop();
    },
    { scope: 'worker', timeout: 60_000 },
  ],
});
