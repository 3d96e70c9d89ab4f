import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { mkdtempSync, rmSync } from 'node:fs';
import net from 'node:net';
import { tmpdir } from 'node:os';
import path from 'node:path';

/** One whole Echotide: mail catcher, background worker and web server, on free ports, with new data. */
export interface RunningServer {
  url: string;
  /** Of the mail catcher's web page and REST API. */
  mailUrl: string;
  databaseFile: string;
  stop: () => Promise<void>;
}

/** Starts the production build with an empty database, or with the demo scenario. */
export async function startServer({ demo }: { demo: boolean }): Promise<RunningServer> {
  const [port, mailPort, mailWebPort] = await freePorts(3);
  const dataDir = mkdtempSync(path.join(tmpdir(), 'echotide-e2e-'));
  const url = `http://127.0.0.1:${port}`;
  const env: NodeJS.ProcessEnv = {
    ...process.env,
    NODE_ENV: 'production',
    PUBLIC_URL: url,
    HOST: '127.0.0.1',
    PORT: String(port),
    DATA_DIR: dataDir,
    MAIL_PORT: String(mailPort),
    MAIL_WEB_PORT: String(mailWebPort),
    SMTP_HOST: '127.0.0.1',
    SMTP_PORT: String(mailPort),
    SMTP_TLS: 'none',
    MAIL_FROM: 'Echotide <echotide@echotide.example>',
    SIGN_IN_ATTEMPTS_PER_MINUTE: '1000',
    CALCULATOR_REQUESTS_PER_MINUTE: '1000',
    LOG_LEVEL: process.env['E2E_LOG_LEVEL'] ?? 'error',
    DEMO: demo ? 'yes' : 'no',
  };
  const running: ChildProcess[] = [];
  const stop = async () => {
    await Promise.all(running.reverse().map((child) => end(child)));
    rmSync(dataDir, { recursive: true, force: true });
  };
  try {
    running.push(await begin(['mail-fake/main.mjs'], env));
    const prepare = ['--import', 'tsx', 'src/cli/prepare.ts', ...(demo ? ['--demo'] : [])];
    await end(await begin(prepare, env), false);
    running.push(await begin(['--import', 'tsx', 'src/worker/main.ts'], env));
    running.push(await begin(['--import', 'tsx', 'src/cli/web.ts'], env));
  } catch (error) {
    await stop();
    throw error;
  }
  return {
    url,
    mailUrl: `http://127.0.0.1:${mailWebPort}`,
    databaseFile: path.join(dataDir, 'echotide.sqlite'),
    stop,
  };
}

/** Starts a process of ours and waits until it reports that it is ready. */
function begin(args: string[], env: NodeJS.ProcessEnv): Promise<ChildProcess> {
  const child = spawn(process.execPath, args, {
    env,
    stdio: ['ignore', 'inherit', 'inherit', 'ipc'],
  });
  return new Promise((resolve, reject) => {
    const tooLong = setTimeout(() => {
      child.kill('SIGKILL');
      reject(new Error(`${args.at(-1)} did not report within 60 s.`));
    }, 60_000);
    child.on('message', (report: { ready?: boolean; failed?: string }) => {
      clearTimeout(tooLong);
      if (report.ready) resolve(child);
      else reject(new Error(report.failed ?? `${args.at(-1)} cannot start.`));
    });
    child.once('exit', (code) => {
      clearTimeout(tooLong);
      reject(new Error(`${args.at(-1)} ended with ${code}.`));
    });
  });
}

async function end(child: ChildProcess, ask = true): Promise<void> {
  if (child.exitCode !== null || child.signalCode !== null) return;
  const ended = once(child, 'exit');
  if (ask) child.kill('SIGTERM');
  const kill = setTimeout(() => child.kill('SIGKILL'), 20_000);
  await ended;
  clearTimeout(kill);
}

/** Held all at once, so that they differ, and let go just before they are used. */
async function freePorts(count: number): Promise<number[]> {
  const holders = await Promise.all(
    Array.from({ length: count }, async () => {
      const holder = net.createServer().listen(0, '127.0.0.1');
      await once(holder, 'listening');
      return holder;
    }),
  );
  const ports = holders.map((holder) => (holder.address() as net.AddressInfo).port);
  await Promise.all(holders.map((holder) => once(holder.close(), 'close')));
  return ports;
}
