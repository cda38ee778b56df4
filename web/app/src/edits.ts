import type { Edit, Plan, Site, Station } from './api';
import { decimalPlace, metres } from './format';

/** Changes as edits of the plan's text; what they do to a link is the server's to say. */

const quantity = (m: number): string => `${metres(m).replace('\u2212', '-')} m`;

export const moveSite = (site: Site, lat: number, lon: number): Edit[] => placeSite(site, decimalPlace(lat, lon));

export const placeSite = (site: Site, place: string): Edit[] => [
  { do: 'set', path: ['sites', site.name, 'at'], value: place },
];

/**
 * raiseAntenna puts a station's antenna at another height. Its feeder grows along, as in the height table; so does
 * the mast, but one that carries other stations grows only where the antenna stands on its top or would pass it.
 */
export function raiseAntenna(site: Site, station: Station, heightM: number): Edit[] {
  const more = heightM - station.above_ground_m;
  if (more === 0) return [];
  const edits: Edit[] = [{ do: 'set', path: [...station.path, 'antenna', 'above_ground'], value: quantity(heightM) }];
  const mast = site.mast;
  if (mast) {
    const along = station.standoff_m === 0 || site.stations.length === 1;
    const wantM = along ? Math.max(mast.height_m + more, 0.5) : Math.max(mast.height_m, heightM);
    if (wantM !== mast.height_m) {
      edits.push({ do: 'set', path: ['sites', site.name, 'mast', 'height'], value: quantity(wantM) });
    }
  }
  if (station.feeder_length_m > 0) {
    const lengthM = Math.max(station.feeder_length_m + more, 0.1);
    edits.push({ do: 'set', path: [...station.path, 'feeder', 'length'], value: quantity(lengthM) });
  }
  return edits;
}

const beamed = new Set(['yagi', 'table', 'cuts', 'datasheet']);

/** hasBeam tells whether antennas of a kind must face somewhere. */
export const hasBeam = (kind: string): boolean => beamed.has(kind);

/** changeAntenna hangs up another antenna; one with a beam that faces nowhere yet is turned to the given site. */
export function changeAntenna(plan: Plan, station: Station, antenna: string, toward: string | undefined): Edit[] {
  const edits: Edit[] = [{ do: 'set', path: [...station.path, 'antenna', 'use'], value: antenna }];
  const kind = plan.antennas.find((a) => a.name === antenna)?.kind ?? '';
  const faces = station.facing_site !== undefined || station.facing_deg !== 0;
  if (hasBeam(kind) && !faces && toward) {
    edits.push({ do: 'set', path: [...station.path, 'antenna', 'facing'], value: `toward ${toward}` });
  }
  return edits;
}

export interface NewSite {
  name: string;
  at: string;
  radio: string;
  antenna: string;
  heightM: number;
  /** The site that the antenna faces; empty for none. */
  toward: string;
}

export const addSite = (s: NewSite): Edit[] => [
  {
    do: 'add',
    path: ['sites'],
    value: {
      name: s.name,
      at: s.at,
      radio: s.radio,
      antenna: {
        use: s.antenna,
        above_ground: quantity(s.heightM),
        ...(s.toward ? { facing: `toward ${s.toward}` } : {}),
      },
    },
  },
];

export const addLink = (from: string, to: string, channel: string): Edit[] => [
  { do: 'add', path: ['links'], value: { from, to, channel } },
];

export const removeLink = (index: number): Edit[] => [{ do: 'remove', path: ['links', String(index)] }];
