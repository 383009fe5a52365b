// A thread of "quantify --each", straight from its TypeScript like the command itself.
import { register } from 'tsx/esm/api';

register();
await import('./each-worker.ts');
