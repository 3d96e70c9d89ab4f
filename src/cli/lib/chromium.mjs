import { existsSync } from 'node:fs';
import { Problem } from './problem.mjs';
import { step } from './progress.mjs';
import { lastLines, run } from './run.mjs';

/** Makes sure that the browser for the browser tests is there. Returns where. */
export async function ensureChromium() {
  const file = process.env.CHROMIUM || '/usr/bin/chromium';
  if (existsSync(file)) return file;
  const advice = `The browser tests need Chromium at ${file}: install it (Debian: apt-get install chromium) or name another one with CHROMIUM.`;
  if (process.env.CHROMIUM || process.getuid?.() !== 0) throw new Problem(advice);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  await step('Installing Chromium', async () => {
    await run('apt-get', ['update', '-qq'], { env });
    const options = ['install', '-y', '-qq', '--no-install-recommends', 'chromium'];
    const { code, output } = await run('apt-get', options, { env });
    if (code !== 0) throw new Problem(`${advice} apt-get said:\n${lastLines(output, 5)}`);
  });
  return file;
}
