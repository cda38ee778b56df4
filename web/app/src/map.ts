import 'maplibre-gl/dist/maplibre-gl.css';
import font from '@fontsource/ibm-plex-sans/files/ibm-plex-sans-latin-500-normal.woff2?url';
import * as maplibre from 'maplibre-gl';
import workerUrl from 'maplibre-gl/dist/maplibre-gl-worker.mjs?url';
import { type Ground, type Plan, type Site, server, taken } from './api';
import type { Changes } from './changes';
import contourUrl from './contour_worker.js?worker&url';
import { moveSite } from './edits';
import { decimalPlace } from './format';
import { drawCover } from './map_cover';
import { boundsOf, figureFeatures, lineFeature, linkFeatures, moveBy, siteFeatures } from './map_data';
import { markImage } from './map_marks';
import { type Colours, colourNames, mapStyle } from './map_style';
import { measureAt, readPlace } from './places';
import { nearest, nearestTo } from './profile';
import type { State } from './state';
import type { Store } from './store';
import { colour } from './theme';
import { words } from './words';

const here = (url: string) => new URL(url, document.baseURI).href;
maplibre.setWorkerUrl(here(workerUrl));

/** What the rest of the page asks of the map. */
export interface MapPart {
  middle(): string;
  show(site: Site): void;
  zoom(by: 1 | -1): void;
  whole(): void;
  /** Settles when all that is asked for has been drawn. */
  settled(): Promise<void>;
}

/** createMap draws the plan on its ground into an element; it throws where the browser offers no WebGL 2. */
export async function createMap(into: HTMLElement, store: Store<State>, changes: Changes): Promise<MapPart> {
  const plan = store.get().plan.value!;
  const ground = await groundOf(store.get().version);
  const contours = ground ? await startContours(ground) : false;
  const style = () => mapStyle({ colours: colours(), ground, origin: location.origin, font: here(font), contours });
  const map = new maplibre.Map({
    container: into,
    style: style(),
    attributionControl: false,
    fadeDuration: 0,
    dragRotate: false,
    pitchWithRotate: false,
    maxPitch: 70,
    cooperativeGestures: matchMedia('(max-width: 60rem)').matches,
    ...startView(store.get(), plan),
  });
  map.addControl(new maplibre.ScaleControl({ maxWidth: 110 }), 'bottom-left');
  map.getCanvas().setAttribute('aria-label', words.map);

  const sites = new Sites(map, store, changes, () => drawData(store.get()));
  const walker = walkerOf(map);
  let shownLink: string | undefined;
  let styled = false;
  let walking = false; // the pointer goes along the chosen link

  function drawData(s: State) {
    if (!s.plan.value) return;
    const set = (id: string, data: unknown) =>
      (map.getSource(id) as maplibre.GeoJSONSource | undefined)?.setData(data as never);
    const links = linkFeatures(s.plan.value, s.links.value, sites.moved);
    set('links', links);
    set('figures', figureFeatures(links));
    set('sites', siteFeatures(s.plan.value, sites.moved));
    set('measured', lineFeature(s.measure?.points ?? []));
    if (s.own) set('own', s.own.data);
  }

  function markChosen(s: State) {
    if (shownLink !== undefined) map.setFeatureState({ source: 'links', id: shownLink }, { chosen: false });
    shownLink = s.link;
    if (s.link !== undefined) map.setFeatureState({ source: 'links', id: s.link }, { chosen: true });
  }

  function restyle() {
    styled = false;
    shownLink = undefined;
    map.setStyle(style(), { diff: false });
  }

  function drawAll() {
    styled = true;
    const c = colours();
    for (const v of ['closes', 'thin', 'fails'] as const) {
      if (map.hasImage(`mark-${v}`)) map.removeImage(`mark-${v}`);
      map.addImage(`mark-${v}`, markImage(v, c[v], c.paper), { pixelRatio: 2 });
    }
    drawData(store.get());
    drawCover(map, store.get().cover, location.origin, c.ink);
    markChosen(store.get());
    if (store.get().solid && ground) solid(map, true);
  }

  map.on('style.load', drawAll);
  map.once('idle', () => into.setAttribute('data-drawn', ''));
  map.on('click', (e) => {
    const s = store.get();
    if (s.measure) {
      void measureAt(store, [e.lngLat.lng, e.lngLat.lat]);
      return;
    }
    const near = 6;
    const box: [maplibre.PointLike, maplibre.PointLike] = [
      [e.point.x - near, e.point.y - near],
      [e.point.x + near, e.point.y + near],
    ];
    const hit = map.queryRenderedFeatures(box, { layers: ['links', 'link-figures'] })[0];
    if (hit) store.set({ link: String(hit.properties.id), way: 0, end: 'from' });
  });
  map.on('mousemove', (e) => {
    const s = store.get();
    const over = map.queryRenderedFeatures(e.point, { layers: ['links', 'link-figures'] });
    map.getCanvas().style.cursor = s.measure ? 'crosshair' : over.length > 0 ? 'pointer' : '';
    const section = s.section.value;
    const along = section !== undefined && over.some((f) => f.properties.id === s.link);
    if (along) store.set({ cursorKm: nearestTo(section.points, e.lngLat.lng, e.lngLat.lat).d_km });
    else if (walking) store.set({ cursorKm: undefined });
    walking = along;
    readPlace({ store, at: [e.lngLat.lng, e.lngLat.lat] });
  });
  map.getCanvas().addEventListener('keydown', (e) => {
    if (e.key !== 'Enter') return;
    const { lng, lat } = map.getCenter();
    if (store.get().measure) void measureAt(store, [lng, lat]);
    else readPlace({ store, at: [lng, lat] });
  });
  map.on('moveend', () => {
    const { lat, lng } = map.getCenter();
    store.set({ view: { ...store.get().view, at: { lat, lon: lng, zoom: map.getZoom() } } });
  });

  store.watch((now, before) => {
    if (now.plan.value !== before.plan.value) sites.follow(now.plan.value);
    if (now.cursorKm !== before.cursorKm || now.section.value !== before.section.value) walker(now);
    if (now.theme !== before.theme) restyle();
    if (!styled) return; // all else is drawn when the style has come
    if (
      now.plan.value !== before.plan.value ||
      now.links.value !== before.links.value ||
      now.measure !== before.measure ||
      now.own !== before.own
    ) {
      drawData(now);
    }
    if (now.link !== before.link) markChosen(now);
    if (coverChanged(now.cover, before.cover)) drawCover(map, now.cover, location.origin, colours().ink);
    if (now.solid !== before.solid && ground) solid(map, now.solid);
  });
  matchMedia('(prefers-color-scheme: dark)').addEventListener('change', restyle);
  sites.follow(plan);

  const motion = () => ({ duration: matchMedia('(prefers-reduced-motion: reduce)').matches ? 0 : 350 });
  await map.once('load');
  return {
    middle: () => decimalPlace(map.getCenter().lat, map.getCenter().lng),
    show: (site) =>
      map.easeTo({ center: [site.place.lon, site.place.lat], zoom: Math.max(map.getZoom(), 13), ...motion() }),
    settled: async () => {
      await new Promise(requestAnimationFrame);
      map.triggerRepaint();
      await map.once('idle');
    },
    zoom: (by) => map.zoomTo(Math.round(map.getZoom() + by), motion()),
    whole: () => {
      const p = store.get().plan.value;
      const bounds = p && boundsOf(p);
      if (bounds) map.fitBounds(bounds, { padding, maxZoom: 14, bearing: 0, pitch: 0, ...motion() });
    },
  };
}

const coverChanged = (a: State['cover'], b: State['cover']) =>
  a?.job.result !== b?.job.result || a?.shown !== b?.shown || a?.bands !== b?.bands;

async function groundOf(version: string): Promise<Ground | undefined> {
  try {
    return await taken(server.GET('/api/ground', { params: { query: { version } } }));
  } catch {
    return undefined; // the links and sites are drawn on plain paper
  }
}

/** startContours lets the map's workers cut contours from the elevation tiles. */
async function startContours(ground: Ground): Promise<boolean> {
  const all = maplibre.getGlobalDispatcher();
  const ready = new Promise<void>((ok) => {
    all.registerMessageHandler('contour-worker', async () => {
      await all.broadcast(
        'contour-worker' as never,
        {
          demUrlPattern: location.origin + ground.tiles,
          encoding: 'terrarium',
          maxzoom: ground.max_zoom,
        } as never,
      );
      ok();
      return undefined as never;
    });
  });
  try {
    await maplibre.importScriptInWorkers(here(contourUrl));
    await ready;
    return true;
  } catch {
    return false;
  }
}

const colours = (): Colours => Object.fromEntries(colourNames.map((n) => [n, colour(n)])) as Colours;

// Room for the buttons at the left and for the names of sites at the rims.
const padding = { left: 84, top: 46, right: 46, bottom: 46 };

function startView(s: State, plan: Plan): Partial<maplibre.MapOptions> {
  const at = s.view.at;
  if (at) return { center: [at.lon, at.lat], zoom: at.zoom };
  const bounds = boundsOf(plan);
  return bounds ? { bounds, fitBoundsOptions: { padding, maxZoom: 14 } } : { center: [0, 0], zoom: 1 };
}

function solid(map: maplibre.Map, on: boolean): void {
  map.setTerrain(on ? { source: 'filled', exaggeration: 2 } : null);
  map.jumpTo({ pitch: on ? 60 : 0, bearing: 0 });
  if (on) map.dragRotate.enable();
  else map.dragRotate.disable();
}

/** The walker is where the section's cursor is. */
function walkerOf(map: maplibre.Map): (s: State) => void {
  const el = document.createElement('div');
  el.className = 'walker';
  const marker = new maplibre.Marker({ element: el });
  return (s) => {
    const section = s.section.value;
    const p = s.cursorKm === undefined || !section ? undefined : section.points[nearest(section.points, s.cursorKm)];
    if (p) marker.setLngLat([p.lon, p.lat]).addTo(map);
    else marker.remove();
  };
}

/** The sites are buttons on the map: to be dragged, or moved by keys. */
class Sites {
  /** Where sites are that have been moved and not yet answered for. */
  readonly moved = new Map<string, [number, number]>();
  private readonly markers = new Map<string, maplibre.Marker>();
  private plan: Plan | undefined;

  constructor(
    private readonly map: maplibre.Map,
    private readonly store: Store<State>,
    private readonly changes: Changes,
    private readonly redraw: () => void,
  ) {}

  follow(plan: Plan | undefined): void {
    if (!plan) return;
    this.plan = plan;
    this.moved.clear();
    for (const [name, marker] of this.markers) {
      if (plan.sites.some((s) => s.name === name)) continue;
      marker.remove();
      this.markers.delete(name);
    }
    for (const site of plan.sites) {
      const at: [number, number] = [site.place.lon, site.place.lat];
      const known = this.markers.get(site.name);
      if (known) known.setLngLat(at);
      else this.markers.set(site.name, this.marker(site.name, at));
    }
  }

  private marker(name: string, at: [number, number]): maplibre.Marker {
    const el = document.createElement('button');
    el.className = 'site';
    el.setAttribute('aria-label', words.site(name));
    el.setAttribute('aria-description', words.siteKeys);
    const marker = new maplibre.Marker({ element: el, draggable: true }).setLngLat(at).addTo(this.map);
    el.setAttribute('aria-label', words.site(name)); // the library names every marker alike
    marker.on('drag', () => this.drag(name, marker.getLngLat().toArray()));
    marker.on('dragend', () => this.drop(name, marker.getLngLat().toArray()));
    el.addEventListener('click', (e) => {
      e.stopPropagation();
      if (this.store.get().measure) void measureAt(this.store, marker.getLngLat().toArray());
      else this.choose(name);
    });
    el.addEventListener('keydown', (e) => {
      const way = { ArrowUp: [0, 1], ArrowDown: [0, -1], ArrowRight: [1, 0], ArrowLeft: [-1, 0] }[e.key];
      if (!way) return;
      e.preventDefault();
      e.stopPropagation();
      const step = e.shiftKey ? 100 : 10;
      const to = moveBy(marker.getLngLat().toArray(), way[0]! * step, way[1]! * step);
      marker.setLngLat(to);
      this.drag(name, to);
      this.dropSoon(name, to);
    });
    return marker;
  }

  private drag(name: string, at: [number, number]) {
    const site = this.plan?.sites.find((s) => s.name === name);
    if (!site) return;
    this.moved.set(name, at);
    this.redraw();
    this.changes.drag(moveSite(site, at[1], at[0]), true);
  }

  private timer: ReturnType<typeof setTimeout> | undefined;

  // Steps by keys that follow on one another are one change.
  private dropSoon(name: string, at: [number, number]) {
    clearTimeout(this.timer);
    this.timer = setTimeout(() => this.drop(name, at), 400);
  }

  private drop(name: string, at: [number, number]) {
    const site = this.plan?.sites.find((s) => s.name === name);
    if (site)
      void this.changes.attempt(moveSite(site, at[1], at[0]), words.siteMoved(name, decimalPlace(at[1], at[0])));
  }

  // A site's own links come one after the other as it is chosen again.
  private choose(name: string) {
    const stations = new Set(this.plan?.sites.find((s) => s.name === name)?.stations.map((st) => st.name));
    const own = (this.plan?.links ?? []).filter((l) => stations.has(l.from) || stations.has(l.to));
    const ids = own.map((l) => l.name ?? `${l.from}..${l.to}`);
    const next = (ids.indexOf(this.store.get().link ?? '') + 1) % Math.max(1, ids.length);
    const link = own[next];
    if (link) this.store.set({ link: ids[next]!, way: 0, end: stations.has(link.from) ? 'from' : 'to' });
  }
}
