import { expect, it } from 'vitest';
import { latestOnly } from '../../../renderer/worker/latest.ts';

it('asks one at a time, skips what was overtaken, and never lets a stale answer come last', async () => {
  const asked: number[] = [];
  const answers: number[] = [];
  const settle: (() => void)[] = [];
  const ask = latestOnly(
    (input: number) => {
      asked.push(input);
      return new Promise<number>((resolve) => settle.push(() => resolve(input)));
    },
    (output) => answers.push(output),
    () => {},
  );
  for (const input of [1, 2, 3, 4]) ask(input);
  expect(asked).toEqual([1]);
  settle[0]?.();
  await Promise.resolve()
    .then(() => {})
    .then(() => {});
  expect(asked).toEqual([1, 4]);
  settle[1]?.();
  await Promise.resolve()
    .then(() => {})
    .then(() => {});
  expect(answers).toEqual([1, 4]);
});

it('goes on after a fault', async () => {
  const faults: unknown[] = [];
  const answers: number[] = [];
  const ask = latestOnly(
    async (input: number) => {
      if (input === 1) throw new Error('fault');
      return input;
    },
    (output) => answers.push(output),
    (error) => faults.push(error),
  );
  ask(1);
  ask(2);
  await new Promise((resolve) => setTimeout(resolve, 5));
  expect(faults).toHaveLength(1);
  expect(answers).toEqual([2]);
});
