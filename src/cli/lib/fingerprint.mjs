import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';

/** A hash over the names and contents of files and whole folders; what is missing counts as absent. */
export function fingerprint(places) {
  const hash = createHash('sha256');
  for (const place of places) add(hash, place);
  return hash.digest('hex');
}

function add(hash, place) {
  if (!existsSync(place)) return;
  if (!statSync(place).isDirectory()) {
    hash.update(`${place}\0`).update(readFileSync(place)).update('\0');
    return;
  }
  for (const name of readdirSync(place).sort()) add(hash, path.join(place, name));
}

export function readMarker(file) {
  return existsSync(file) ? readFileSync(file, 'utf8').trim() : undefined;
}

export function writeMarker(file, value) {
  mkdirSync(path.dirname(file), { recursive: true });
  writeFileSync(file, `${value}\n`);
}
