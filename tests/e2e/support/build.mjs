import { ensureBuilt } from '../../../src/cli/lib/build.mjs';

/** Builds the application once, when its sources have changed. E2E_BUILT=yes takes dist/ as it is. */
export default async function build() {
  if (process.env.E2E_BUILT !== 'yes') await ensureBuilt();
}
