import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureBuilt } from './lib/build.mjs';
import { ensureChromium } from './lib/chromium.mjs';
import { countPlaywright, countVitest } from './lib/counts.mjs';
import { ensureInstalled } from './lib/install.mjs';
import { requireNode } from './lib/nodeVersion.mjs';
import { run } from './lib/run.mjs';

/**
 * `npm test [-- step …]`: every check, each shown as it runs, also after one has failed. The last line is
 * always "N passed, N failed": the tests of Vitest and Playwright, and one for each other step.
 * Steps: format, lint, check, types, unit, build, e2e.
 */
process.chdir(fileURLToPath(new URL('../..', import.meta.url)));
const reports = mkdtempSync(path.join(tmpdir(), 'echotide-test-'));
process.on('exit', () => rmSync(reports, { recursive: true, force: true }));
for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => process.exit(1));

const env = {
  ...process.env,
  ASTRO_TELEMETRY_DISABLED: '1',
  LOG_LEVEL: process.env.LOG_LEVEL ?? 'silent',
};
const tool = (name, ...args) =>
  run(process.execPath, [`node_modules/${name}`, ...args], { show: true, env });

const STEPS = {
  format: () => passes(tool('prettier/bin/prettier.cjs', '--check', '.')),
  lint: () => passes(tool('eslint/bin/eslint.js', '.', '--max-warnings', '0')),
  check: () => passes(tool('astro/astro.js', 'check', '--minimumFailingSeverity', 'warning')),
  types: checkTypes,
  unit: runVitest,
  build: async () => {
    await ensureBuilt();
    return { passed: 1, failed: 0 };
  },
  e2e: runPlaywright,
};

async function passes(running) {
  const { code } = await running;
  return code === 0 ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
}

/** auth-astro ships TypeScript sources that do not hold to our strictness; what is said of them is left out. */
async function checkTypes() {
  const args = [
    'node_modules/typescript/bin/tsc',
    '--noEmit',
    '--pretty',
    'false',
    '-p',
    'tsconfig.json',
  ];
  const { code, output } = await run(process.execPath, args, { env });
  const own = output
    .split('\n')
    .filter((line) => line !== '' && !/^(node_modules\/|\s)/.test(line));
  if (own.length > 0) console.log(own.join('\n'));
  // 0 is clean, 2 is "errors found"; anything else means that the compiler itself broke.
  const clean = own.length === 0 && (code === 0 || code === 2);
  return clean ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 };
}

async function runVitest() {
  const file = path.join(reports, 'vitest.json');
  const args = ['run', '--reporter=default', '--reporter=json', `--outputFile.json=${file}`];
  const { code } = await tool('vitest/vitest.mjs', ...args);
  return neverGreen(code, countVitest(file));
}

async function runPlaywright() {
  const file = path.join(reports, 'playwright.json');
  env.CHROMIUM = await ensureChromium();
  env.PLAYWRIGHT_JSON_OUTPUT_NAME = file;
  const { code } = await tool('@playwright/test/cli.js', 'test', '--reporter=list,json');
  return neverGreen(code, countPlaywright(file));
}

/** A tool that says it failed has failed, whatever its report says. */
function neverGreen(code, counts) {
  return code !== 0 && counts.failed === 0 ? { ...counts, failed: 1 } : counts;
}

function stepsAsked() {
  const asked = process.argv.slice(2);
  const unknown = asked.filter((name) => !(name in STEPS));
  if (unknown.length > 0) {
    throw new Error(
      `There is no step ${unknown.join(', ')}; there are ${Object.keys(STEPS).join(', ')}.`,
    );
  }
  return asked.length > 0
    ? Object.keys(STEPS).filter((name) => asked.includes(name))
    : Object.keys(STEPS);
}

const total = { passed: 0, failed: 0 };
const summary = [];
try {
  requireNode();
  const names = stepsAsked();
  await ensureInstalled();
  for (const name of names) {
    console.log(`\n── ${name}`);
    const counts = await STEPS[name]().catch((error) => {
      console.error(error.message);
      return { passed: 0, failed: 1 };
    });
    summary.push(`${name.padEnd(8)}${counts.passed} passed, ${counts.failed} failed`);
    total.passed += counts.passed;
    total.failed += counts.failed;
  }
} catch (error) {
  console.error(error.message);
  total.failed += 1;
}
console.log(`\n${summary.join('\n')}\n`);
console.log(`${total.passed} passed, ${total.failed} failed`);
process.exit(total.failed > 0 ? 1 : 0);
