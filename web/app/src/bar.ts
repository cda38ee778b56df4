import { html, nothing } from 'lit';
import { changed, linkId, type State, stationOf, type Theme } from './state';
import { words } from './words';

export interface BarEvents {
  undo(): void;
  redo(): void;
  save(): void;
  print(): void;
  own(file: File): void;
  theme(t: Theme): void;
}

const nextTheme: Record<Theme, Theme> = { system: 'light', light: 'dark', dark: 'system' };

/** The bar over the page: what is open, what has been changed, and what can be done with all of it. */
export function bar(s: State, on: BarEvents) {
  const plan = s.plan.value;
  const before = s.at > 0 ? s.steps[s.at] : undefined;
  const after = s.steps[s.at + 1];
  const count = s.at - s.steps.findIndex((st) => st.version === s.saved);
  const dirty = changed(s);
  return html`<header class="bar">
    <h1><span class="product">${words.product}</span> <span class="title">${plan?.title ?? ''}</span></h1>
    <p class="state">${plan ? (dirty ? words.unsaved(Math.max(1, Math.abs(count)), plan.file) : words.savedAs(plan.file)) : ''}</p>
    <div class="tools">
      <button ?disabled=${!before} title=${before ? words.undoWhat(before.what) : words.undo} @click=${on.undo}>${words.undo}</button>
      <button ?disabled=${!after} title=${after ? words.redoWhat(after.what) : words.redo} @click=${on.redo}>${words.redo}</button>
      <button class="main" ?disabled=${!dirty || s.saving} @click=${on.save}>${s.saving ? words.saving : words.save}</button>
      ${plan ? files(s, on) : nothing}
      <button title=${words.themeLong[s.theme]} @click=${() => on.theme(nextTheme[s.theme])}>${words.theme[s.theme]}</button>
    </div>
  </header>`;
}

function files(s: State, on: BarEvents) {
  const of = (path: string, query: Record<string, string> = {}) =>
    `./api/${path}?${new URLSearchParams({ ...query, ...(s.version ? { version: s.version } : {}) })}`;
  const d = words.download;
  const list = [
    [d.plan, of('files/plan.yaml')],
    [d.table, of('files/links.txt')],
    [d.csv, of('files/links.csv')],
    [d.json, of('files/links.json')],
    [d.geojson, of('files/links.geojson')],
    [d.sites, of('layers/sites')],
  ];
  const link = s.plan.value?.links.find((l) => linkId(l) === s.link);
  if (link) {
    const path = { link: linkId(link) };
    list.push([d.section, of('files/section.csv', path)], [d.sectionPicture, of('files/section.svg', path)]);
    const end = link[s.end];
    if (stationOf(s.plan.value, end)) {
      const station = { station: end, mast: String(s.withMast) };
      list.push(
        [d.antenna, of('files/antenna.txt', station)],
        [d.pattern, of('files/pattern.svg', station)],
        [d.vswr, of('files/vswr.svg', station)],
      );
    }
  }
  return html`<details class="menu">
    <summary>${words.files}</summary>
    <ul>
      ${list.map(([name, href]) => html`<li><a href=${href!} download>${name}</a></li>`)}
      <li>
        <label>${words.own}
          <input
            type="file" accept=".geojson,.json,application/geo+json"
            @change=${(e: Event) => {
              const file = (e.target as HTMLInputElement).files?.[0];
              if (file) on.own(file);
            }}
          />
        </label>
      </li>
      <li><button class="plain" @click=${on.print}>${words.print}</button></li>
    </ul>
  </details>`;
}
