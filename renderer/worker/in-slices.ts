interface Slices {
  /** Given what the work last yielded, once for each slice. */
  readonly onProgress: (done: number) => void;
  /** Asked before each slice. */
  readonly isStopped: () => boolean;
  /** How long a slice may hold the thread; what is under way is finished first. */
  readonly sliceMs?: number;
  readonly now?: () => number;
  /** Lets whatever else waits for the thread go first. */
  readonly pause?: () => Promise<void>;
}

/** Two frames of a drag that is followed by refits: what waits for the thread waits no longer. */
const usualSliceMs = 30;

/**
 * Does long work a slice at a time, so that other calls are answered in between. Null if it was
 * stopped before its end.
 */
export async function inSlices<T>(
  work: Iterator<number, T>,
  {
    onProgress,
    isStopped,
    sliceMs = usualSliceMs,
    now = () => performance.now(),
    pause = afterWhatWaits,
  }: Slices,
): Promise<T | null> {
  for (;;) {
    await pause();
    if (isStopped()) return null;
    const until = now() + sliceMs;
    let step = work.next();
    while (!step.done && now() < until) step = work.next();
    if (step.done) return step.value;
    onProgress(step.value);
  }
}

/** A task of its own: messages that came in meanwhile stand before it. */
function afterWhatWaits(): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve));
}
