import { type Heights, Refused } from './api';

export type Cell = Heights['cells'][number];

/** The range of heights that is weighed: from a low mast to about twice the planned one, in some ten steps. */
export interface HeightRange {
  fromM: number;
  toM: number;
  stepM: number;
}

/** rangeAround lays a range of heights round the planned one, so that the planned one is among them. */
export function rangeAround(plannedM: number): HeightRange {
  const stepM = [0.5, 1, 2, 5, 10].find((s) => plannedM / s <= 6) ?? Math.ceil(plannedM / 6);
  const below = Math.min(4, Math.floor((plannedM - 1) / stepM));
  const fromM = plannedM - Math.max(0, below) * stepM;
  return { fromM, toM: fromM + 8 * stepM, stepM };
}

/** byHeight puts the cells into rows of growing height, each in the order of the antennas. */
export function byHeight(cells: readonly Cell[]): { heightM: number; cells: Cell[] }[] {
  const rows = new Map<number, Cell[]>();
  for (const c of cells) {
    const row = rows.get(c.height_m);
    if (row) row.push(c);
    else rows.set(c.height_m, [c]);
  }
  return [...rows].sort(([a], [b]) => a - b).map(([heightM, list]) => ({ heightM, cells: list }));
}

/** shadeOf classes a margin into nine shades: 3 dB each from 3 dB below zero on. */
export const shadeOf = (db: number): number => Math.min(8, Math.max(0, Math.floor(db / 3) + 2));

/** Weighed heights also tell which antennas cannot hang there, and why. */
export interface Weighed {
  cells: Cell[];
  impossible: { antenna: string; why: string }[];
}

/** weighed asks for one antenna after the other, so that one which cannot hang on this mast leaves the others a column. */
export async function weighed(
  antennas: readonly string[],
  ask: (antenna: string) => Promise<Heights>,
): Promise<Weighed> {
  const all: Weighed = { cells: [], impossible: [] };
  for (const antenna of antennas) {
    try {
      all.cells.push(...(await ask(antenna)).cells);
    } catch (error) {
      if (!(error instanceof Refused) || error.problem.status !== 422) throw error;
      all.impossible.push({ antenna, why: error.problem.detail });
    }
  }
  return all;
}
