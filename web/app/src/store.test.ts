import { expect, test } from 'vitest';
import { createStore } from './store';

const settled = () => new Promise<void>((ok) => queueMicrotask(ok));

test('watchers are told once for several changes, with what was before', async () => {
  const store = createStore({ a: 1, b: 1 });
  const heard: unknown[] = [];
  store.watch((now, before) => heard.push([before, now]));
  store.set({ a: 2 });
  store.set({ b: 3 });
  expect(store.get()).toEqual({ a: 2, b: 3 });
  await settled();
  expect(heard).toEqual([
    [
      { a: 1, b: 1 },
      { a: 2, b: 3 },
    ],
  ]);
});

test('a change made by a watcher is told in its turn', async () => {
  const store = createStore({ a: 1, twice: 0 });
  store.watch((now, before) => {
    if (now.a !== before.a) store.set({ twice: 2 * now.a });
  });
  store.set({ a: 5 });
  await settled();
  await settled();
  expect(store.get().twice).toBe(10);
});
