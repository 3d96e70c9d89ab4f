import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { FIGURE_ANCHORS } from '~/domain/window/figures';
import { LEDGER_EXPLANATIONS } from '~/domain/link/ledger';
import { paths } from '~/paths';
import { filesIn } from '../../architecture/sources';

const FOLDER = 'src/content/method';
/** A part of the method page is one file; the page takes its name, without the number, as the anchor. */
const parts = new Map(
  readdirSync(FOLDER).map((file) => [
    file.replace(/^\d+-/, '').replace(/\.md$/, ''),
    readFileSync(`${FOLDER}/${file}`, 'utf8'),
  ]),
);

describe('parts of the method page', () => {
  it.each(Object.entries(FIGURE_ANCHORS))('%s leads to a part that exists: %s', (_name, anchor) => {
    expect([...parts.keys()]).toContain(anchor);
  });

  it('are there for every term of a ledger', () => {
    for (const key of Object.keys(LEDGER_EXPLANATIONS)) {
      expect(FIGURE_ANCHORS).toHaveProperty(key);
    }
  });

  it('are where every other link to one of them leads', () => {
    const used = filesIn('src')
      .filter((file) => /\.(tsx|astro|md)$/.test(file))
      .flatMap((file) => {
        const text = readFileSync(file, 'utf8');
        const calls = [...text.matchAll(/methodPart\(\s*'([^']+)'/g)];
        const links = file.startsWith(FOLDER) ? [...text.matchAll(/\]\(#([^)]+)\)/g)] : [];
        return [...calls, ...links].map(([, anchor]) => anchor!);
      });
    expect(used.length).toBeGreaterThan(8);
    for (const anchor of used) expect([...parts.keys()]).toContain(anchor);
    expect(paths.methodPart('doppler')).toBe(`${paths.method}#doppler`);
  });

  it.each([...parts])('%s has a formula, a source, its limits and its error', (_id, text) => {
    expect(text).toMatch(/\*\*What is (computed|taken)\.\*\*/);
    expect(text).toContain('\n> ');
    expect(text).toMatch(/\*\*Sources?\.\*\*/);
    const howGood = text.slice(text.indexOf('**How good.**'));
    expect(howGood.length).toBeGreaterThan(100);
    expect(text).toMatch(/_[^_]*(read in the source|from memory|computed for this project)[^_]*_/i);
  });

  it.each(['atmosphere', 'antenna', 'polarisation', 'chance', 'spread', 'modes', 'margin', 'sky'])(
    '%s says plainly which of its bounds nobody else stands for',
    (id) => {
      const text = parts.get(id)!;
      const howGood = text.slice(text.indexOf('**How good.**'));
      expect(howGood).toMatch(/_[^_]*own estimate, no source[^_]*_/i);
    },
  );

  it('come in the order of their numbers', () => {
    for (const file of readdirSync(FOLDER)) {
      const text = readFileSync(`${FOLDER}/${file}`, 'utf8');
      expect(text).toContain(`\norder: ${Number.parseInt(file, 10)}\n`);
    }
  });
});
