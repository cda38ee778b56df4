/**
 * latest makes a function that asks and hands on what it got. A new call aborts the one in flight, so that a late
 * answer never replaces a newer one.
 */
export function latest<A extends unknown[], T>(
  ask: (signal: AbortSignal, ...args: A) => Promise<T>,
  got: (answer: T) => void,
): (...args: A) => void {
  let running: AbortController | undefined;
  return async (...args) => {
    running?.abort();
    const mine = new AbortController();
    running = mine;
    try {
      const answer = await ask(mine.signal, ...args);
      if (!mine.signal.aborted) got(answer);
    } catch (error) {
      if (!mine.signal.aborted) throw error;
    }
  };
}

/** newest runs one call at a time and, of those made meanwhile, only the last one: for what is dragged. */
export function newest<A>(run: (args: A) => Promise<void>): (args: A) => void {
  let busy = false;
  let next: { args: A } | undefined;
  return async (args) => {
    next = { args };
    if (busy) return;
    busy = true;
    while (next) {
      const { args } = next;
      next = undefined;
      await run(args);
    }
    busy = false;
  };
}
