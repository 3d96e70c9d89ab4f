import { existsSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureBuilt } from './lib/build.mjs';
import { superviseUntilStopped, typescript } from './lib/children.mjs';
import { ensureInstalled } from './lib/install.mjs';
import { requireNode } from './lib/nodeVersion.mjs';
import { portFrom, requireFreePorts } from './lib/ports.mjs';
import { step } from './lib/progress.mjs';

/**
 * `npm start`: the demo. Installs and builds when needed, makes the data folder with the demo scenario,
 * and runs the mail catcher, the background worker and the web server until Ctrl-C.
 * `--dev` runs the development server instead of the built application.
 */
await superviseUntilStopped(async (children) => {
  requireNode();
  process.chdir(fileURLToPath(new URL('../..', import.meta.url)));
  const dev = process.argv.includes('--dev');

  const host = process.env.HOST || '127.0.0.1';
  const port = portFrom('PORT', 4321);
  const mailPort = portFrom('MAIL_PORT', 1025);
  const mailWebPort = portFrom('MAIL_WEB_PORT', 1080);
  await requireFreePorts([
    { name: 'PORT', port, host },
    { name: 'MAIL_PORT', port: mailPort, host: '127.0.0.1' },
    { name: 'MAIL_WEB_PORT', port: mailWebPort, host: '127.0.0.1' },
  ]);
  const dataDir = path.resolve(process.env.DATA_DIR || 'db/data');
  const publicUrl = process.env.PUBLIC_URL || `http://127.0.0.1:${port}`;
  const env = {
    ...process.env,
    ASTRO_TELEMETRY_DISABLED: '1',
    NODE_ENV: dev ? 'development' : 'production',
    PUBLIC_URL: publicUrl,
    HOST: host,
    PORT: String(port),
    DATA_DIR: dataDir,
    MAIL_PORT: String(mailPort),
    MAIL_WEB_PORT: String(mailWebPort),
    SMTP_HOST: '127.0.0.1',
    SMTP_PORT: String(mailPort),
    SMTP_TLS: 'none',
    MAIL_FROM: process.env.MAIL_FROM || 'Echotide <echotide@echotide.example>',
    LOG_LEVEL: process.env.LOG_LEVEL || 'warn',
    DEMO: 'yes',
  };

  await ensureInstalled();
  const signIns = readSignIns();
  const first = !existsSync(path.join(dataDir, 'echotide.sqlite'));
  const catcher = children.start('The mail catcher', ['mail-fake/main.mjs'], { env });
  const prepare = step(first ? 'Making the data folder and the demo' : 'Checking the data', () =>
    children.start('Preparing the data', typescript('src/cli/prepare.ts', '--demo'), {
      env,
      once: true,
    }),
  );
  await Promise.all([catcher, prepare, ...(dev ? [] : [ensureBuilt()])]);
  await step('Starting', () =>
    Promise.all([
      children.start('The background worker', typescript('src/worker/main.ts'), { env }),
      dev
        ? startDev(children, env)
        : children.start('The web server', typescript('src/cli/web.ts'), { env }),
    ]),
  );
  sayWhere(publicUrl, mailWebPort, await signIns);
});

async function startDev(children, env) {
  const { HOST: host, PORT: port } = env;
  const args = ['node_modules/astro/astro.js', 'dev', '--host', host, '--port', port];
  await children.start('The development server', args, { env, waitForReport: false });
  for (let tries = 0; tries < 300; tries += 1) {
    const answered = await fetch(`http://${host}:${port}/`).then(
      () => true,
      () => false,
    );
    if (answered) return;
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
}

async function readSignIns() {
  const { tsImport } = await import('tsx/esm/api');
  return (await tsImport('../../db/seed/signIns.ts', import.meta.url)).DEMO_SIGN_INS;
}

function sayWhere(publicUrl, mailWebPort, signIns) {
  const width = Math.max(...signIns.map(({ email }) => email.length));
  const rows = signIns.map(
    ({ role, email, password, says }) =>
      `  ${role.padEnd(14)} ${email.padEnd(width)}  ${password}   ${says}`,
  );
  console.log(`
Echotide   ${publicUrl}
Mail       http://127.0.0.1:${mailWebPort} (every mail ends here; none leaves this machine)

Sign in as
${rows.join('\n')}

Ctrl-C ends everything.
`);
}
