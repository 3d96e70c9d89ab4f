import { register } from 'tsx/esm/api';

// A thread does not inherit the loader that its process was started with.
register();
await import('./thread.ts');
