import { mkdtempSync } from 'node:fs';
import { rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { MailDev } from 'maildev';

/**
 * A mail server that keeps every mail and sends none on: SMTP on MAIL_PORT, a web page and its API on
 * MAIL_WEB_PORT, both on 127.0.0.1 only. Mails are gone when it ends.
 */
const folder = mkdtempSync(path.join(tmpdir(), 'echotide-mail-'));
const catcher = new MailDev({
  smtp: Number(process.env.MAIL_PORT ?? 1025),
  ip: '127.0.0.1',
  web: Number(process.env.MAIL_WEB_PORT ?? 1080),
  webIp: '127.0.0.1',
  maxEmails: 1000,
  silent: true,
});

let stopping = false;
async function stop() {
  if (stopping) return;
  stopping = true;
  setTimeout(() => process.exit(0), 2000).unref();
  await catcher.stop().catch(() => undefined);
  await rm(folder, { recursive: true, force: true });
  process.exit(0);
}

// Its scratch files (attachments) go where they can be removed at the end.
process.env.TMPDIR = folder;
process.on('SIGTERM', stop);
process.on('SIGINT', stop);
if (process.send) process.on('disconnect', stop);

// It says where it listens even when told to be silent; `npm start` says so in its own words.
console.info = () => undefined;
try {
  await catcher.start();
  process.send?.({ ready: true });
} catch (error) {
  const failed =
    error.code === 'EADDRINUSE'
      ? `Port ${error.port} is taken by another program.`
      : `The mail catcher cannot start: ${error.message}.`;
  if (process.send) process.send({ failed }, () => process.exit(1));
  else {
    console.error(failed);
    process.exit(1);
  }
}
