import createClient from 'openapi-fetch';
import type { components, paths } from './api_schema';
import { words } from './words';

type Schemas = components['schemas'];
export type Plan = Schemas['PlanAnswer'];
export type Site = Schemas['SiteSummary'];
export type Station = Schemas['StationSummary'];
export type Links = Schemas['Links'];
export type Link = Schemas['Link'];
export type Direction = Schemas['Direction'];
export type Line = Schemas['Line'];
export type Verdict = Link['verdict'];
export type Section = Schemas['Section'];
export type Antenna = Schemas['AntennaAnswer'];
export type Ground = Schemas['GroundAnswer'];
export type Place = Schemas['PlaceAnswer'];
export type Measured = Schemas['Measured'];
export type CoverJob = Schemas['CoverJob'];
export type Heights = Schemas['Heights'];
export type Edit = Schemas['EditBody'];
export type Problem = Schemas['Problem'];
export type ProblemDetail = Schemas['ProblemDetail'];

export const server = createClient<paths>();

/** A Refused is a call that the server answered with a problem, or did not answer (status 0). */
export class Refused extends Error {
  constructor(readonly problem: Problem) {
    super(problem.detail);
  }
}

/** taken returns the body of an answer, or throws what was wrong. */
export async function taken<T>(call: Promise<{ data?: T; error?: Problem }>): Promise<T> {
  let answer: { data?: T; error?: Problem };
  try {
    answer = await call;
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new Refused({ title: '', status: 0, detail: words.noAnswer });
  }
  if (answer.data === undefined) throw new Refused(answer.error ?? { title: '', status: 0, detail: words.noAnswer });
  return answer.data;
}
