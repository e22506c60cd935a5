import { register } from 'tsx/esm/api';

// A thread does not get the loader of the process it belongs to: without this it could not read TypeScript.
register();
await import('./reading-thread.ts');
