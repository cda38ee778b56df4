import { server, taken } from './api';
import { newest } from './latest';
import type { State } from './state';
import type { Store } from './store';

type Position = [number, number];

/** readPlace asks what is at a place: its notations, its ground, and the margin of the coverage map that is shown. */
export const readPlace = newest(async ({ store, at }: { store: Store<State>; at: Position }) => {
  const { version, cover } = store.get();
  const [lon, lat] = at;
  try {
    const place = await taken(server.GET('/api/place', { params: { query: { version, lon, lat } } }));
    if (!cover?.job.result || cover.shown === 'none') {
      store.set({ place });
      return;
    }
    const path = { id: cover.job.id };
    const value = await taken(server.GET('/api/coverage/{id}/value', { params: { path, query: { lon, lat } } }));
    store.set({ place: { ...place, margin_db: value.margin_db } });
  } catch {
    store.set({ place: undefined });
  }
});

/** measureAt takes the first or the second place of a measurement, and asks for the way between them. */
export async function measureAt(store: Store<State>, at: Position): Promise<void> {
  const first = store.get().measure?.points ?? [];
  const points = first.length === 1 ? [...first, at] : [at];
  store.set({ measure: { points } });
  const [a, b] = points;
  if (!a || !b) return;
  try {
    const query = { from_lon: a[0], from_lat: a[1], to_lon: b[0], to_lat: b[1] };
    const way = await taken(server.GET('/api/measure', { params: { query } }));
    if (store.get().measure?.points === points) store.set({ measure: { points, way } });
  } catch {
    store.set({ measure: { points: [] } });
  }
}
