import { pageAs } from './support/people';
import { expect, test } from './support/test';

/** Ends the session, or is no page of ours. */
const LEFT_OUT = /^\/sign-out|^\/_astro\//;
/** Enough of the pages that differ only in their id or their filter. */
const MOST_OF_A_KIND = 3;

for (const who of [null, 'Ylva', 'Osvin'] as const) {
  test(`every link that ${who ?? 'a visitor'} can come across leads somewhere`, async ({
    demo,
    browser,
  }) => {
    const page = await pageAs(browser, demo, who);
    const dead: string[] = [];
    const seen = new Set<string>(['/']);
    const kinds = new Map<string, number>();
    const waiting: { address: string; from: string }[] = [{ address: '/', from: 'the beginning' }];
    for (let next = waiting.shift(); next; next = waiting.shift()) {
      const response = await page.request.get(demo.url + next.address);
      if (response.status() >= 400) {
        dead.push(`${next.address} answers ${response.status()}, linked from ${next.from}`);
        continue;
      }
      if (!(response.headers()['content-type'] ?? '').startsWith('text/html')) continue;
      for (const address of addressesIn(await response.text())) {
        const kind = address.replace(/[\w-]{30,}/g, ':id').replace(/\?.*/, '?');
        const count = kinds.get(kind) ?? 0;
        if (seen.has(address) || LEFT_OUT.test(address) || count >= MOST_OF_A_KIND) continue;
        kinds.set(kind, count + 1);
        seen.add(address);
        waiting.push({ address, from: next.address });
      }
    }
    expect(dead).toEqual([]);
    expect(seen.size).toBeGreaterThan(8);
    await page.context().close();
  });
}

/** Addresses on this server that the page links to or posts to, without fragments. */
function addressesIn(html: string): string[] {
  return [...html.matchAll(/<a\b[^>]*\bhref="(\/[^"#]*)/g)].map(([, address]) =>
    address!.replaceAll('&amp;', '&').replaceAll('&#38;', '&'),
  );
}
