import { existsSync, readFileSync, writeFileSync } from 'node:fs';

const FILE = new URL('results.json', import.meta.url);

export interface BenchResult {
  /** Names are read by others: see DEVELOPERS.md before changing one. */
  name: string;
  value: number;
  unit: string;
  /** What it was measured against, in the same run. */
  peer?: string;
  note?: string;
}

/** One part of the benchmarks, chosen by the start of a part of its name: `npm run bench -- race`. */
export interface Bench {
  name: string;
  run: () => BenchResult[] | Promise<BenchResult[]>;
}

/** Puts results into tests/bench/results.json, replacing those of the same name. */
export function mergeResults(results: readonly BenchResult[]): void {
  const known: BenchResult[] = existsSync(FILE)
    ? (JSON.parse(readFileSync(FILE, 'utf8')) as BenchResult[])
    : [];
  const merged = new Map(known.map((result) => [result.name, result]));
  for (const result of results) merged.set(result.name, result);
  const sorted = [...merged.values()].sort((a, b) => a.name.localeCompare(b.name));
  writeFileSync(FILE, `${JSON.stringify(sorted, null, 2)}\n`);
}

export function printResults(results: readonly BenchResult[]): void {
  const rows = results.map(({ name, value, unit, peer = '', note = '' }) => [
    name,
    value.toPrecision(4),
    unit,
    [peer, note].filter((text) => text !== '').join(' — '),
  ]);
  const widths = [0, 1, 2].map((column) => Math.max(0, ...rows.map((row) => row[column]!.length)));
  for (const [name, value, unit, words] of rows) {
    const line = [name!.padEnd(widths[0]!), value!.padStart(widths[1]!), unit!.padEnd(widths[2]!)];
    console.log(`${line.join('  ')}  ${words!}`);
  }
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}

/** Milliseconds that a call takes. */
export function timed(work: () => unknown): number {
  const startMs = performance.now();
  work();
  return performance.now() - startMs;
}
