import AxeBuilder from '@axe-core/playwright';
import { expect, type Page } from '@playwright/test';

/** Collects what a page complains about: console errors, uncaught exceptions, refused resources, CSP. */
export function watchPage(page: Page): { complaints: string[] } {
  const complaints: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error') complaints.push(`console: ${message.text()}`);
  });
  page.on('pageerror', (error) => complaints.push(`exception: ${error.message}`));
  page.on('response', (response) => {
    if (response.status() >= 500) complaints.push(`${response.status()} ${response.url()}`);
  });
  return { complaints };
}

const STANDARDS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];

/** Violations as sentences that say what to look at. Of the colours only, where nothing else can differ. */
export async function axeViolations(
  page: Page,
  { coloursOnly = false }: { coloursOnly?: boolean } = {},
): Promise<string[]> {
  const axe = new AxeBuilder({ page });
  const { violations } = await (
    coloursOnly ? axe.withRules(['color-contrast']) : axe.withTags(STANDARDS)
  ).analyze();
  return violations.map(
    ({ id, help, nodes }) =>
      `${id}: ${help}\n${nodes
        .slice(0, 3)
        .map((node) => `    ${node.html.slice(0, 160)} — ${node.failureSummary ?? ''}`)
        .join('\n')}`,
  );
}

/** How far the page can be scrolled sideways, in pixels, and what sticks out. */
export async function sidewaysOverflow(page: Page): Promise<string[]> {
  return page.evaluate(() => {
    const width = document.documentElement.clientWidth;
    if (document.documentElement.scrollWidth <= width) return [];
    const out = [...document.body.querySelectorAll('*')]
      .filter((element) => element.getBoundingClientRect().right > width + 1)
      .map((element) => `${element.tagName.toLowerCase()}.${element.getAttribute('class') ?? ''}`);
    return [`${document.documentElement.scrollWidth - width} px too wide`, ...out.slice(-5)];
  });
}

/** Islands have taken over: nothing is left that waits for its script. */
export async function hydrated(page: Page): Promise<void> {
  await expect(page.locator('astro-island[ssr][client="load"]')).toHaveCount(0);
  await expect(page.locator('astro-island[ssr][client="only"]')).toHaveCount(0);
}
