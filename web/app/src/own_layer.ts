import { type Problem, Refused } from './api';
import { words } from './words';

/** An OwnLayer is GeoJSON from the user's machine, drawn under the links. It is read here and sent nowhere. */
export interface OwnLayer {
  name: string;
  data: object;
}

const maxBytes = 50e6;
const kinds = [
  'FeatureCollection',
  'Feature',
  'GeometryCollection',
  'Point',
  'MultiPoint',
  'LineString',
  'MultiLineString',
  'Polygon',
  'MultiPolygon',
];

/** ownLayer reads a file that the user has picked; what is no GeoJSON is refused. */
export async function ownLayer(file: Pick<File, 'name' | 'size' | 'text'>): Promise<OwnLayer> {
  if (file.size > maxBytes) throw refusal(words.ownTooLarge(file.name));
  let data: unknown;
  try {
    data = JSON.parse(await file.text());
  } catch {
    throw refusal(words.ownUnread(file.name));
  }
  if (!kinds.includes((data as { type?: string } | null)?.type ?? '')) throw refusal(words.ownUnread(file.name));
  return { name: file.name, data: data as object };
}

const refusal = (detail: string): Refused => new Refused({ title: '', status: 422, detail } satisfies Problem);
