import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';

/**
 * Runs `work` while no other copy of Echotide in this folder installs or builds. Waits for a living
 * holder; a lock left behind by a dead process is taken over.
 */
export async function withLock(name, work) {
  const lock = path.join('.astro', `${name}.lock`);
  mkdirSync('.astro', { recursive: true });
  while (!take(lock)) await new Promise((resolve) => setTimeout(resolve, 300));
  try {
    return await work();
  } finally {
    rmSync(lock, { force: true });
  }
}

function take(lock) {
  try {
    writeFileSync(lock, String(process.pid), { flag: 'wx' });
    return true;
  } catch (error) {
    if (error.code !== 'EEXIST') throw error;
    if (!isAlive(lock)) rmSync(lock, { force: true });
    return false;
  }
}

function isAlive(lock) {
  try {
    const pid = Number(readFileSync(lock, 'utf8'));
    // Empty for the moment between creating and writing.
    if (pid === 0) return true;
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return error.code === 'EPERM';
  }
}
