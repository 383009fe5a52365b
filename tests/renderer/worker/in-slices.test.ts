import { describe, expect, it } from 'vitest';
import { inSlices } from '../../../renderer/worker/in-slices.ts';

/** Work of ten steps, each of which takes ten on this clock. */
function slowWork() {
  let clock = 0;
  function* steps(): Generator<number, string> {
    for (let done = 1; done <= 10; done++) {
      clock += 10;
      yield done;
    }
    return 'whole';
  }
  return { work: steps(), now: () => clock };
}

describe('long work in slices', () => {
  it('lets others go first before every slice, and tells how far it is', async () => {
    const { work, now } = slowWork();
    const told: (number | string)[] = [];
    const result = await inSlices(work, {
      now,
      sliceMs: 30,
      pause: async () => void told.push('others'),
      onProgress: (done) => told.push(done),
      isStopped: () => false,
    });
    expect(result).toBe('whole');
    expect(told).toEqual(['others', 3, 'others', 6, 'others', 9, 'others']);
  });

  it('stops between slices, and then gives nothing', async () => {
    const { work, now } = slowWork();
    let done = 0;
    const result = await inSlices(work, {
      now,
      sliceMs: 30,
      onProgress: (reached) => {
        done = reached;
      },
      isStopped: () => done >= 6,
    });
    expect(result).toBeNull();
    expect(done).toBe(6);
  });

  it('goes on with a step that is longer than a slice', async () => {
    const { work, now } = slowWork();
    const told: number[] = [];
    await inSlices(work, {
      now,
      sliceMs: 1,
      onProgress: (done) => told.push(done),
      isStopped: () => false,
    });
    expect(told).toHaveLength(10);
  });

  it('answers another call of the same thread before it ends', async () => {
    const { work, now } = slowWork();
    const order: string[] = [];
    const long = inSlices(work, {
      now,
      sliceMs: 10,
      onProgress: () => {},
      isStopped: () => false,
    }).then(() => order.push('long'));
    setTimeout(() => order.push('short'));
    await long;
    expect(order).toEqual(['short', 'long']);
  });
});
