import type { RequestListener } from 'node:http';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { config } from '../server/config';
import { createWebServer, drain } from '../server/http/webServer';
import { log } from '../server/log';
import { failToStart, onStopRequest, reportReady } from '../server/process/lifecycle';
import { closeServices, services } from '../server/services';

const MAX_BODY_BYTES = 6_000_000;
const LONGEST_DRAIN_MS = 10_000;

/** Entry of the web process: the built application behind our own HTTP server. */
async function main(): Promise<void> {
  const { host, port, trustProxy } = config();
  services();
  process.env['ASTRO_NODE_AUTOSTART'] = 'disabled';
  const entry = pathToFileURL(path.resolve('dist/server/entry.mjs')).href;
  const { handler } = (await import(entry)) as { handler: RequestListener };
  const server = createWebServer(handler, { maxBodyBytes: MAX_BODY_BYTES, trustProxy });
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, resolve);
  });
  onStopRequest(async () => {
    await drain(server, LONGEST_DRAIN_MS);
    await closeServices();
    log.info('web server stopped');
  });
  reportReady(port);
}

main().catch(failToStart);
