import { expect, it } from 'vitest';
import { runFaults } from './faultRun';

it('loses no mail while the server fails in every way and the worker is killed again and again', async () => {
  const report = await runFaults(15, 20_270_118);
  expect(report.lost).toEqual([]);
  expect(report.strange).toEqual([]);
  expect(report.unexplained).toEqual([]);
  expect(report.integrity).toBe('ok');
  // The faults took place; only a kill can end a round before anything was felt of it.
  expect(report.kills).toBe(3);
  const unfelt = Object.entries(report.conversations).filter(([, count]) => count === 0);
  expect(unfelt.length, JSON.stringify(unfelt)).toBeLessThanOrEqual(report.kills);
  expect(report.sent).toBeGreaterThan(report.mails / 2);
  expect(report.sent + report.setAside).toBe(report.mails);
}, 120_000);
