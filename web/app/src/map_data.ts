import type { Links, Plan } from './api';
import { margin } from './format';
import { linkId } from './state';
import { words } from './words';

type Position = [number, number];

/** placesOf lists where the stations and sites of a plan are, by name. */
export function placesOf(plan: Plan): Map<string, Position> {
  const places = new Map<string, Position>();
  for (const site of plan.sites) {
    const at: Position = [site.place.lon, site.place.lat];
    places.set(site.name, at);
    for (const st of site.stations) places.set(st.name, at);
  }
  return places;
}

/** linkFeatures draws the links between their ends, with the verdicts of those that have been worked out. */
export function linkFeatures(plan: Plan, links: Links | undefined, moved: ReadonlyMap<string, Position>) {
  const places = new Map([...placesOf(plan)].map(([name, at]) => [name, moved.get(siteName(plan, name)) ?? at]));
  return collection(
    plan.links.flatMap((planned) => {
      const [from, to] = [places.get(planned.from), places.get(planned.to)];
      if (!from || !to) return [];
      const id = linkId(planned);
      const l = links?.links.find((x) => linkId(x) === id);
      const told = l ? { verdict: l.verdict, margin: l.margin_db, label: words.db(margin(l.margin_db)) } : {};
      return [
        {
          type: 'Feature' as const,
          properties: { id, ...told },
          geometry: { type: 'LineString' as const, coordinates: [from, to] },
        },
      ];
    }),
  );
}

const siteName = (plan: Plan, station: string): string =>
  plan.sites.find((s) => s.name === station || s.stations.some((st) => st.name === station))?.name ?? station;

type LinkFeatures = ReturnType<typeof linkFeatures>;

/** figureFeatures puts each link's mark and margin at its middle. */
export const figureFeatures = (links: LinkFeatures) =>
  collection(
    links.features
      .filter((f) => 'verdict' in f.properties)
      .map((f) => {
        const [[x1, y1], [x2, y2]] = f.geometry.coordinates as [Position, Position];
        return { ...f, geometry: { type: 'Point' as const, coordinates: [(x1 + x2) / 2, (y1 + y2) / 2] } };
      }),
  );

export function siteFeatures(plan: Plan, moved: ReadonlyMap<string, Position>) {
  return collection(
    plan.sites.map((s) => ({
      type: 'Feature' as const,
      properties: { id: s.name },
      geometry: { type: 'Point' as const, coordinates: moved.get(s.name) ?? [s.place.lon, s.place.lat] },
    })),
  );
}

export function lineFeature(points: readonly Position[]) {
  if (points.length < 2) return collection([]);
  return collection([
    { type: 'Feature' as const, properties: {}, geometry: { type: 'LineString' as const, coordinates: [...points] } },
  ]);
}

const collection = <F>(features: F[]) => ({ type: 'FeatureCollection' as const, features });

/** boundsOf is the box of all sites: west, south, east, north. */
export function boundsOf(plan: Plan): [number, number, number, number] | undefined {
  const lons = plan.sites.map((s) => s.place.lon);
  const lats = plan.sites.map((s) => s.place.lat);
  if (lons.length === 0) return undefined;
  return [Math.min(...lons), Math.min(...lats), Math.max(...lons), Math.max(...lats)];
}

/** moveBy is a place some metres to the east and north of another, on the sphere: for steps by keys. */
export function moveBy([lon, lat]: Position, eastM: number, northM: number): Position {
  const perDegree = 111_195; // of latitude, at the mean radius of 6371 km
  return [lon + eastM / (perDegree * Math.cos((lat * Math.PI) / 180)), lat + northM / perDegree];
}
