import type { Layout } from './layout.ts';
import { oneAxisManyTraces } from './one-axis-many-traces.ts';

/** All layouts, in the order in which they are tried: the first that knows the table reads it. */
export const layouts: readonly Layout[] = [oneAxisManyTraces];
