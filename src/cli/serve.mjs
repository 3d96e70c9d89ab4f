import { fileURLToPath } from 'node:url';
import { ensureBuilt } from './lib/build.mjs';
import { superviseUntilStopped, typescript } from './lib/children.mjs';
import { loadDotEnv } from './lib/dotEnv.mjs';
import { ensureInstalled } from './lib/install.mjs';
import { requireNode } from './lib/nodeVersion.mjs';

/**
 * `npm run serve`: production. The settings come from the environment or .env (see .env.example); no
 * demo, no mail catcher. SIGTERM finishes requests and mails under way and ends with 0.
 */
await superviseUntilStopped(async (children) => {
  requireNode();
  process.chdir(fileURLToPath(new URL('../..', import.meta.url)));
  loadDotEnv();
  const env = { ...process.env, NODE_ENV: 'production', ASTRO_TELEMETRY_DISABLED: '1', DEMO: 'no' };

  await ensureInstalled();
  // First, because it refuses settings that are missing, in a sentence.
  await children.start('Preparing the data', typescript('src/cli/prepare.ts'), { env, once: true });
  await ensureBuilt();
  await Promise.all([
    children.start('The background worker', typescript('src/worker/main.ts'), { env }),
    children.start('The web server', typescript('src/cli/web.ts'), { env }),
  ]);
  console.log(
    `Echotide serves ${env.PUBLIC_URL} on ${env.HOST || '127.0.0.1'}:${env.PORT || 4321}.`,
  );
});
