import { expect, it } from 'vitest';
import { runFaults } from './faultRun';

it('loses no mail while the server fails in every way and the worker is killed again and again', async () => {
  const report = await runFaults(15, 20_270_118);
  expect(report.lost).toEqual([]);
  expect(report.strange).toEqual([]);
  expect(report.unexplained).toEqual([]);
  expect(report.integrity).toBe('ok');
  // The faults took place.
  expect(report.kills).toBe(3);
  for (const [mood, count] of Object.entries(report.conversations)) {
    expect(count, mood).toBeGreaterThan(0);
  }
  expect(report.sent).toBeGreaterThan(report.mails / 2);
  expect(report.sent + report.setAside).toBe(report.mails);
}, 120_000);
