import './style.css';
import './print.css';
import { render } from 'lit';
import { refused } from './asked';
import { createChanges } from './changes';
import { createCover } from './cover';
import { desk } from './desk';
import { readHash, writeHash } from './hash';
import type { MapPart } from './map';
import { ownLayer } from './own_layer';
import { page } from './page';
import { changed, initialState } from './state';
import { createStore } from './store';
import { applyTheme, rememberedTheme } from './theme';
import { words } from './words';

const store = createStore({ ...initialState(readHash(location.hash)), theme: rememberedTheme() });
const changes = createChanges(store);
const cover = createCover(store);
let map: MapPart | undefined;

const bar = {
  undo: () => void changes.undo(),
  redo: () => void changes.redo(),
  save: () => void changes.save(),
  // The map is a picture: it is drawn in the light colours of paper before it is printed.
  print: async () => {
    const { theme } = store.get();
    store.set({ theme: 'light' });
    await map?.settled();
    window.print();
    store.set({ theme });
  },
  own: async (file: File) => {
    try {
      store.set({ own: await ownLayer(file), trouble: undefined });
    } catch (error) {
      store.set({ trouble: refused(error) });
    }
  },
  theme: (theme: ReturnType<typeof rememberedTheme>) => store.set({ theme }),
};

let drawing = false;
function draw() {
  if (drawing) return;
  drawing = true;
  requestAnimationFrame(() => {
    drawing = false;
    render(
      page(store, changes, cover, bar, () => map),
      document.body,
    );
    measure();
  });
}

// The section's box is measured where it appears; its chart is drawn to the pixel.
const boxes = new ResizeObserver(() => measure());
function measure() {
  const box = document.getElementById('section-box');
  if (!box) return;
  boxes.observe(box);
  const { clientWidth: sectionWidth, clientHeight: sectionHeight } = box;
  const s = store.get();
  if (sectionWidth !== s.sectionWidth || sectionHeight !== s.sectionHeight) store.set({ sectionWidth, sectionHeight });
}

desk(store);
store.watch((now, before) => {
  draw();
  if (now.theme !== before.theme) applyTheme(now.theme);
  if (now.plan.value !== before.plan.value) document.title = `${now.plan.value?.title ?? ''} – ${words.product}`;
  const { at, cover: asked } = now.view;
  const covered = now.cover?.job.site ?? asked;
  const hash = writeHash({
    ...(at ? { at } : {}),
    ...(now.link ? { link: now.link } : {}),
    ...(covered ? { cover: covered } : {}),
  });
  if (hash !== location.hash) history.replaceState(null, '', hash || location.pathname);
});

window.addEventListener('hashchange', () => {
  const { link } = readHash(location.hash);
  if (link && link !== store.get().link) store.set({ link });
});
window.addEventListener('focus', () => void changes.look());
window.addEventListener('beforeunload', (e) => {
  if (changed(store.get())) e.preventDefault();
});
window.addEventListener('keydown', (e) => {
  if (!(e.ctrlKey || e.metaKey) || e.target instanceof HTMLInputElement) return;
  const run = { z: e.shiftKey ? bar.redo : bar.undo, Z: bar.redo, y: bar.redo, s: bar.save }[e.key];
  if (!run) return;
  e.preventDefault();
  run();
});

// The tables stand before the map does, and without it.
async function drawMap() {
  const into = document.getElementById('map');
  if (!into) return;
  try {
    const { createMap } = await import('./map');
    map = await createMap(into, store, changes);
    store.set({ map: 'ready' });
  } catch (error) {
    if (!(error instanceof Error)) throw error;
    store.set({ map: 'none' });
  }
}

applyTheme(store.get().theme);
draw();
await changes.read();
if (store.get().view.cover) void cover.start(store.get().view.cover!);
requestAnimationFrame(() => void drawMap());
