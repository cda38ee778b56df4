import { type Problem, Refused } from './api';

/** What has been asked of the server: the last answer stays in view while the next is waited for. */
export interface Asked<T> {
  readonly value?: T;
  readonly problem?: Problem;
  readonly waiting: boolean;
}

export const notAsked: Asked<never> = { waiting: false };

export const waitFor = <T>(before: Asked<T>): Asked<T> => ({ ...before, waiting: true });

export const answered = <T>(value: T): Asked<T> => ({ value, waiting: false });

/** refused keeps the last answer beside the problem; an error that is none of the server's goes on its way. */
export function refused<T>(error: unknown): Asked<T> {
  if (error instanceof Refused) return { problem: error.problem, waiting: false };
  throw error;
}
