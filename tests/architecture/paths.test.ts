import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { paths } from '~/paths';
import { filesIn } from './sources';

/** The first step of every address we have, such as "skeds". */
function firstSteps(tree: object): string[] {
  return Object.values(tree).flatMap((value: unknown) => {
    if (typeof value === 'string') return value.split(/[/?#]/)[1] ?? '';
    if (typeof value === 'function')
      return firstSteps([probe(value as (...given: never[]) => string)]);
    return firstSteps(value as object);
  });
}

/** Functions in paths.ts take ids, or lists of them. */
function probe(make: (...given: never[]) => string): string {
  try {
    return make(...(['x', 'x', 'x'] as never[]));
  } catch {
    return make(...([['x'], 'x', 'x'] as never[]));
  }
}

describe('addresses', () => {
  const steps = [...new Set(firstSteps(paths))].filter((step) => step !== '');
  const spelled = new RegExp(`['"\`]/(?:${steps.join('|')})(?=[/?#'"\`$])[^'"\`]*`, 'g');

  it('knows the addresses', () => {
    expect(steps).toContain('skeds');
    expect(steps).toContain('api');
  });

  it('are spelled out in src/paths.ts only', () => {
    const found = filesIn('src')
      .filter((file) => /\.(ts|tsx|astro)$/.test(file) && file !== 'src/paths.ts')
      .flatMap((file) =>
        [...readFileSync(file, 'utf8').matchAll(spelled)].map(([text]) => `${file}: ${text}`),
      )
      // The middleware asks whether an address belongs to the API at all.
      .filter((line) => line !== "src/middleware.ts: '/api/");
    expect(found).toEqual([]);
  });
});
