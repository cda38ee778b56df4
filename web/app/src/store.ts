/** A store holds one state; watchers are told once a microtask, with the state now and the one they were last told. */
export interface Store<S> {
  get(): S;
  set(patch: Partial<S>): void;
  watch(told: (now: S, before: S) => void): void;
}

export function createStore<S extends object>(initial: S): Store<S> {
  let now = initial;
  let before = initial;
  let waiting = false;
  const watchers: ((now: S, before: S) => void)[] = [];
  const tell = () => {
    waiting = false;
    const was = before;
    before = now;
    for (const told of watchers) told(now, was);
  };
  return {
    get: () => now,
    set(patch) {
      now = { ...now, ...patch };
      if (waiting) return;
      waiting = true;
      queueMicrotask(tell);
    },
    watch: (told) => void watchers.push(told),
  };
}
