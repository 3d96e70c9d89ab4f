import { accessSync, constants, existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { fingerprint, readMarker, writeMarker } from './fingerprint.mjs';
import { withLock } from './lock.mjs';
import { Problem } from './problem.mjs';
import { step } from './progress.mjs';
import { lastLines, run } from './run.mjs';

const MARKER = 'node_modules/.echotide-installed';

/** Installs the packages when the lock file or the Node.js version is not the one installed for. */
export async function ensureInstalled() {
  const wanted = () => `${fingerprint(['package-lock.json'])} ${process.versions.modules}`;
  if (readMarker(MARKER) === wanted()) return;
  await withLock('install', async () => {
    if (readMarker(MARKER) === wanted()) return;
    if (!installedBefore()) {
      await step('Installing packages (a few minutes the first time)', install);
    }
    await requireNativeParts();
    writeMarker(MARKER, wanted());
  });
}

/** Somebody may have run `npm ci` by hand: npm's own record then names the same packages. */
function installedBefore() {
  const record = 'node_modules/.package-lock.json';
  if (!existsSync(record)) return false;
  const packagesIn = (file) => JSON.parse(readFileSync(file, 'utf8')).packages;
  const installed = packagesIn(record);
  return Object.entries(packagesIn('package-lock.json')).every(
    ([place, { version, optional }]) =>
      place === '' || installed[place]?.version === version || (optional && !installed[place]),
  );
}

async function install() {
  const { code, output } = await run('npm', ['ci', '--no-audit', '--no-fund', '--include=dev']);
  if (code === 0) return;
  if (code === 127) throw new Problem('npm is missing: install it (Debian: apt-get install npm).');
  throw new Problem(
    missingCompiler() ?? `The packages could not be installed; npm said:\n${lastLines(output, 15)}`,
  );
}

async function requireNativeParts() {
  const probe =
    "new (require('better-sqlite3'))(':memory:').close(); require('@node-rs/argon2').hashSync('x')";
  const { code, output } = await run(process.execPath, ['-e', probe]);
  if (code === 0) return;
  throw new Problem(
    missingCompiler() ??
      `The database driver does not load; remove node_modules and start again. It said:\n${lastLines(output, 8)}`,
  );
}

/** better-sqlite3 is compiled here when no ready-made binary can be had; that needs these programs. */
function missingCompiler() {
  const missing = ['make', 'g++', 'python3'].filter((program) => !onPath(program));
  if (missing.length === 0) return undefined;
  return `The database driver has to be compiled here and ${missing.join(', ')} cannot be found: install them (Debian: apt-get install build-essential python3) and start again.`;
}

function onPath(program) {
  return (process.env.PATH ?? '').split(path.delimiter).some((folder) => {
    try {
      accessSync(path.join(folder, program), constants.X_OK);
      return true;
    } catch {
      return false;
    }
  });
}
