import path from 'node:path';
import { startApp } from './start-app.mjs';

// `npm start`. Plain JavaScript, because it runs before anything is built.

const stop = new AbortController();
for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => stop.abort());

process.exitCode = await startApp({
  root: path.resolve(import.meta.dirname, '../..'),
  args: process.argv.slice(2),
  env: process.env,
  say: (line) => process.stdout.write(`${line}\n`),
  stop: stop.signal,
});
