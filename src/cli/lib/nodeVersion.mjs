import { Problem } from './problem.mjs';

const LEAST = [20, 12];

/** Refuses a Node.js that is too old, before anything else is tried. */
export function requireNode(version = process.versions.node) {
  const [major = 0, minor = 0] = version.split('.').map(Number);
  if (major < LEAST[0] || (major === LEAST[0] && minor < LEAST[1])) {
    throw new Problem(
      `Echotide needs Node.js ${LEAST.join('.')} or newer; this is ${version}. Install a newer one and start again.`,
    );
  }
}
