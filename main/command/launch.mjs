#!/usr/bin/env node
// Runs the command line straight from its TypeScript: no build step between a clone and a result.
import { register } from 'tsx/esm/api';

register();
await import('./monobis.ts');
