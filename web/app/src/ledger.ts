import type { Direction, Line } from './api';

/** A Bar is one step of the ledger as it is drawn: from and to in drawn decibels, cut where it is too long to draw. */
export interface Bar {
  from: number;
  to: number;
  cut: boolean;
}

export interface Ledger {
  bars: Bar[];
  /** The margin's bar, from the zero line. */
  margin: Bar;
  /** What the drawing spans. */
  least: number;
  most: number;
  /** Sum after each line, in real decibels. */
  sums: number[];
}

/** A step above this is drawn as long as this, with a cut through it: beside 150 dB of loss 1 dB would not be seen. */
export const longestDrawnDB = 40;

const drawn = (db: number): number => Math.sign(db) * Math.min(Math.abs(db), longestDrawnDB);

/** ledgerOf lays the lines of a budget out as steps that follow on one another, the last one ending at the margin. */
export function ledgerOf(d: Direction): Ledger {
  const bars: Bar[] = [];
  const sums: number[] = [];
  let at = 0;
  let sum = 0;
  for (const line of d.lines) {
    const to = at + drawn(line.value_db);
    bars.push({ from: at, to, cut: Math.abs(line.value_db) > longestDrawnDB });
    at = to;
    sum += line.value_db;
    sums.push(sum);
  }
  const margin = { from: at - drawn(d.margin_db), to: at, cut: Math.abs(d.margin_db) > longestDrawnDB };
  const ends = [0, margin.from, ...bars.map((b) => b.to)];
  return { bars, margin, least: Math.min(...ends), most: Math.max(...ends), sums };
}

export type Owner = 'from' | 'to' | 'path' | 'allowances';

/** A Part is a run of lines that belong together; the names of its lines no longer name the station. */
export interface Part {
  owner: Owner;
  lines: { line: Line; name: string; index: number }[];
}

/** partsOf splits a budget's lines into the sender's, the path's, the receiver's and the allowances. */
export function partsOf(d: Direction): Part[] {
  const parts: Part[] = [];
  d.lines.forEach((line, index) => {
    const [owner, name] = ownerOf(d, line);
    const last = parts.at(-1);
    const entry = { line, name, index };
    if (last?.owner === owner) last.lines.push(entry);
    else parts.push({ owner, lines: [entry] });
  });
  return parts;
}

function ownerOf(d: Direction, line: Line): [Owner, string] {
  for (const end of ['from', 'to'] as const) {
    const prefix = `${d[end]}: `;
    if (line.name.startsWith(prefix)) return [end, line.name.slice(prefix.length)];
  }
  return [line.kind === 'allowance' ? 'allowances' : 'path', line.name];
}
