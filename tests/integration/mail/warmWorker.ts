/** Imported before src/worker/main.ts: loads what that loads, then holds it back until it is told to go. */
await import('../../../src/server/jobs');
await import('../../../src/server/services');
await import('../../../src/server/process/lifecycle');
process.send?.({ ready: true });
await new Promise((resolve) => process.once('message', resolve));

export {};
