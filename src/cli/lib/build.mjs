import { fingerprint, readMarker, writeMarker } from './fingerprint.mjs';
import { withLock } from './lock.mjs';
import { Problem } from './problem.mjs';
import { step } from './progress.mjs';
import { lastLines, run } from './run.mjs';

const MARKER = 'dist/.echotide-built';
const SOURCES = [
  'src',
  'public',
  'db/migrations',
  'db/seed',
  'astro.config.mjs',
  'auth.config.ts',
  'tsconfig.json',
  'package-lock.json',
];

/** Builds the application when the sources are not the ones it was built from. */
export async function ensureBuilt() {
  if (readMarker(MARKER) === fingerprint(SOURCES)) return;
  await withLock('build', async () => {
    const wanted = fingerprint(SOURCES);
    if (readMarker(MARKER) === wanted) return;
    await step('Building', build);
    writeMarker(MARKER, wanted);
  });
}

async function build() {
  const { code, output } = await run(process.execPath, ['node_modules/astro/astro.js', 'build'], {
    env: { ...process.env, ASTRO_TELEMETRY_DISABLED: '1', NODE_ENV: 'production' },
  });
  if (code !== 0) throw new Problem(`The build failed:\n${lastLines(output, 25)}`);
}
