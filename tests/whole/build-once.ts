import path from 'node:path';
import { build } from '../../main/desktop/build.mjs';

/** Builds screen and shell once, before the whole-app tests; what is already there is not trusted. */
export default async function setup(): Promise<void> {
  const failure = await build(path.resolve(import.meta.dirname, '../..'), 'error');
  if (failure) throw new Error(failure);
}
