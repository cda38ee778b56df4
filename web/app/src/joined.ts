import type { Links } from './api';
import { linkId } from './state';

/** joined puts links that were worked out anew in the place of the former ones. */
export function joined(all: Links | undefined, some: Links): Links {
  if (!all || some.links.length >= all.links.length) return some;
  const fresh = new Map(some.links.map((l) => [linkId(l), l]));
  return { ...all, links: all.links.map((l) => fresh.get(linkId(l)) ?? l) };
}
