/**
 * Runs one call at a time and only the newest of those that wait: a drag asks far more often than
 * it can be answered, and a stale answer must never come after a newer one.
 */
export function latestOnly<In, Out>(
  work: (input: In) => Promise<Out>,
  done: (output: Out, input: In) => void,
  failed: (error: unknown) => void,
): (input: In) => void {
  let isBusy = false;
  let waiting: { readonly input: In } | null = null;
  const next = async (input: In): Promise<void> => {
    isBusy = true;
    try {
      const output = await work(input);
      // while a newer one waits, this one is still the newest answer there is
      done(output, input);
    } catch (error) {
      failed(error);
    }
    isBusy = false;
    const following = waiting;
    waiting = null;
    if (following) void next(following.input);
  };
  return (input) => {
    if (isBusy) waiting = { input };
    else void next(input);
  };
}
