import { expect, test } from 'vitest';
import { Refused } from './api';
import { byHeight, rangeAround, shadeOf, weighed } from './heights';

test('the planned height is among those weighed, and none is below half a metre', () => {
  for (const planned of [0.5, 1, 1.5, 2, 4, 6, 7.3, 10, 16, 18, 45, 100]) {
    const { fromM, toM, stepM } = rangeAround(planned);
    const steps = (planned - fromM) / stepM;
    expect(Math.abs(steps - Math.round(steps)), `${planned}`).toBeLessThan(1e-9);
    expect(fromM).toBeGreaterThanOrEqual(0.5);
    expect(toM).toBeGreaterThan(planned);
  }
});

test('cells go into rows by height', () => {
  const cell = (height_m: number, antenna: string) => ({
    height_m,
    antenna,
    margin_db: 0,
    verdict: 'thin' as const,
    worst_link: '',
  });
  const rows = byHeight([cell(4, 'rod'), cell(2, 'rod'), cell(2, 'pair'), cell(4, 'pair')]);
  expect(rows.map((r) => [r.heightM, r.cells.map((c) => c.antenna)])).toEqual([
    [2, ['rod', 'pair']],
    [4, ['rod', 'pair']],
  ]);
});

test('shades grow with the margin and stay within the nine', () => {
  expect([-40, -6, -0.1, 0, 2.9, 3, 18, 90].map(shadeOf)).toEqual([0, 0, 1, 2, 2, 3, 8, 8]);
});

test('an antenna that cannot hang there leaves the others their columns', async () => {
  const ask = async (antenna: string) => {
    if (antenna === 'beam') throw new Refused({ title: '', status: 422, detail: 'runs into the mast' });
    return { site: 'A', cells: [{ height_m: 4, antenna, margin_db: 1, verdict: 'thin' as const, worst_link: '' }] };
  };
  const { cells, impossible } = await weighed(['beam', 'rod'], ask);
  expect(cells.map((c) => c.antenna)).toEqual(['rod']);
  expect(impossible).toEqual([{ antenna: 'beam', why: 'runs into the mast' }]);
  const gone = () => Promise.reject(new Refused({ title: '', status: 0, detail: '' }));
  await expect(weighed(['rod'], gone)).rejects.toThrow(Refused);
});
