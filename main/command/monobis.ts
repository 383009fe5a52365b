import { exitCodes } from './exit-codes.ts';
import { run } from './run.ts';

process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  // the reader went away (`| head`): nothing is left to say to it
  process.exit(error.code === 'EPIPE' ? exitCodes.done : exitCodes.fault);
});

// what cannot be said to anyone is no fault of the work
process.stderr.on('error', () => {});

process.exitCode = await run(process.argv.slice(2), {
  result: (text) =>
    new Promise((resolve) => {
      process.stdout.write(text, () => resolve());
    }),
  say: (line) => {
    process.stderr.write(`${line}\n`);
  },
});
