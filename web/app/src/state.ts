import type { Antenna, Link, Links, Measured, Place, Plan, Section, Site, Station } from './api';
import { type Asked, notAsked } from './asked';
import type { Cover } from './cover';
import type { View } from './hash';
import type { Weighed } from './heights';
import type { OwnLayer } from './own_layer';

/** A Step is a version of the plan and what made it, for undo. */
export interface Step {
  version: string;
  text: string;
  what: string;
}

export type Theme = 'system' | 'light' | 'dark';

export interface State {
  plan: Asked<Plan>;
  links: Asked<Links>;
  section: Asked<Section>;
  antenna: Asked<Antenna>;
  heights: Asked<Weighed>;

  /** Version of the plan in view; empty is the file's. */
  version: string;
  /** The versions made so far, the file's as it was read first, and the place among them. */
  steps: readonly Step[];
  at: number;
  /** Version that the file holds, as far as this page has read or written it. */
  saved: string;
  /** Something is being dragged: the version in view is a passing one. */
  dragging: boolean;
  saving: boolean;
  /** What went wrong with the last change or saving. */
  trouble: Asked<never> | undefined;

  link?: string;
  /** Which of the link's directions the ledger shows, 0 out and 1 back. */
  way: 0 | 1;
  /** Which of the link's ends the antenna panel and the height table show. */
  end: 'from' | 'to';
  withMast: boolean;
  cursorKm: number | undefined;
  /** Ledger lines whose source is shown, by name. */
  open: ReadonlySet<string>;
  sectionWidth: number;
  sectionHeight: number;

  map: 'waiting' | 'ready' | 'none';
  view: View;
  /** Whether the ground is shown in relief, from the side. */
  solid: boolean;
  /** What is under the pointer; the margin is that of the coverage map that is shown. */
  place: (Place & { margin_db?: number | null }) | undefined;
  cover: Cover | undefined;
  /** A layer of the user's own. */
  own: OwnLayer | undefined;
  /** Two places, or fewer, whose distance is asked; the measuring goes on until it is undefined. */
  measure: { points: [number, number][]; way?: Measured } | undefined;
  theme: Theme;
  /** What is told to those who cannot see it. */
  said: string;
}

export function initialState(view: View): State {
  return {
    plan: notAsked,
    links: notAsked,
    section: notAsked,
    antenna: notAsked,
    heights: notAsked,
    version: '',
    steps: [],
    at: 0,
    saved: '',
    dragging: false,
    saving: false,
    trouble: undefined,
    ...(view.link ? { link: view.link } : {}),
    way: 0,
    end: 'from',
    withMast: true,
    cursorKm: undefined,
    open: new Set(),
    sectionWidth: 0,
    sectionHeight: 0,
    map: 'waiting',
    view,
    solid: false,
    place: undefined,
    cover: undefined,
    own: undefined,
    measure: undefined,
    theme: 'system',
    said: '',
  };
}

/** linkId names a link as the server takes it. */
export const linkId = (l: { name?: string; from: string; to: string }): string => l.name ?? `${l.from}..${l.to}`;

export const chosenLink = (s: State): Link | undefined => s.links.value?.links.find((l) => linkId(l) === s.link);

/** stationOf finds a station by the name that links give it, with its site. */
export function stationOf(plan: Plan | undefined, name: string): { site: Site; station: Station } | undefined {
  for (const site of plan?.sites ?? []) {
    const station = site.stations.find((st) => st.name === name);
    if (station) return { site, station };
  }
  return undefined;
}

export const changed = (s: State): boolean => s.version !== '' && s.version !== s.saved;
