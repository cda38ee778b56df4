import { expect, test } from 'vitest';
import type { Direction, Line } from './api';
import { ledgerOf, longestDrawnDB, partsOf } from './ledger';

const line = (name: string, value_db: number, kind: Line['kind'] = 'loss'): Line => ({
  name,
  value_db,
  kind,
  source: '',
});

// A budget made up by hand: 37 - 2 + 4 - 140 + 3 + 117 - 8 = 11.
const direction: Direction = {
  from: 'A',
  to: 'B: west',
  frequency_hz: 150e6,
  margin_db: 11,
  received_dbm: -98,
  required_dbm: -117,
  transmission_loss_db: 140,
  fade_db: 8,
  departure_deg: 0,
  arrival_deg: 0,
  lines: [
    line('A: transmitter', 37, 'power'),
    line('A: feeder', -2),
    line('A: directivity', 4, 'gain'),
    line('free space, 9 km', -140),
    line('B: west: directivity', 3, 'gain'),
    line('B: west: sensitivity', 117, 'need'),
    line('fading', -8, 'allowance'),
  ],
};

test('steps follow on one another and end at the margin', () => {
  const l = ledgerOf(direction);
  l.bars.forEach((bar, i) => {
    expect(bar.from).toBe(i === 0 ? 0 : l.bars[i - 1]!.to);
  });
  expect(l.sums.at(-1)).toBeCloseTo(direction.margin_db, 9);
  expect(l.margin.to).toBe(l.bars.at(-1)!.to);
  expect(l.margin.to - l.margin.from).toBe(11);
});

test('long steps are cut, short ones are true to scale', () => {
  const l = ledgerOf(direction);
  expect(l.bars.map((b) => b.cut)).toEqual([false, false, false, true, false, true, false]);
  expect(l.bars[3]!.to - l.bars[3]!.from).toBe(-longestDrawnDB);
  expect(l.bars[1]!.to - l.bars[1]!.from).toBe(-2);
  expect(l.least).toBeLessThanOrEqual(Math.min(...l.bars.map((b) => b.to)));
});

test('lines go to their owners in the order of the signal', () => {
  const parts = partsOf(direction);
  expect(parts.map((p) => p.owner)).toEqual(['from', 'path', 'to', 'allowances']);
  expect(parts[2]!.lines.map((x) => x.name)).toEqual(['directivity', 'sensitivity']);
  expect(parts.flatMap((p) => p.lines.map((x) => x.index))).toEqual([0, 1, 2, 3, 4, 5, 6]);
});
