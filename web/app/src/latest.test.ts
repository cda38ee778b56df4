import { expect, test } from 'vitest';
import { latest, newest } from './latest';

const after = (ms: number) => new Promise<void>((ok) => setTimeout(ok, ms));

test('latest drops an answer that a newer call has overtaken', async () => {
  const got: number[] = [];
  const aborted: number[] = [];
  const ask = latest(
    async (signal, n: number, ms: number) => {
      signal.addEventListener('abort', () => aborted.push(n));
      await after(ms);
      return n;
    },
    (n) => got.push(n),
  );
  ask(1, 30);
  ask(2, 1);
  await after(50);
  expect(got).toEqual([2]);
  expect(aborted).toEqual([1]);
});

test('newest skips what came between while it was busy', async () => {
  const ran: number[] = [];
  const run = newest(async (n: number) => {
    ran.push(n);
    await after(5);
  });
  for (const n of [1, 2, 3, 4]) run(n);
  await after(40);
  expect(ran).toEqual([1, 4]);
});
