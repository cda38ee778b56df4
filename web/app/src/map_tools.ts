import { html, nothing } from 'lit';
import { coverLegend } from './cover_panel';
import { bearing, fixed, margin } from './format';
import type { MapPart } from './map';
import type { State } from './state';
import type { Store } from './store';
import { words } from './words';

/** The buttons over the map, and what it reads out of the place under the pointer. */
export function mapTools(store: Store<State>, map: MapPart | undefined) {
  const s = store.get();
  const button = (label: string, sign: string, run: () => void, pressed?: boolean) => html`<button
    aria-label=${label} title=${label} aria-pressed=${pressed ?? nothing} @click=${run}
  >${sign}</button>`;
  return html`
    <div class="map-tools">
      ${button(words.zoomIn, '+', () => map?.zoom(1))}
      ${button(words.zoomOut, '−', () => map?.zoom(-1))}
      ${button(words.wholePlan, '⤢', () => map?.whole())}
      ${button(words.solidLong, words.solid, () => store.set({ solid: !s.solid }), s.solid)}
      ${button(words.measureLong, '↔', () => store.set({ measure: s.measure ? undefined : { points: [] } }), s.measure !== undefined)}
    </div>
    ${s.measure ? html`<p class="map-word top" role="status">${measured(s.measure)}</p>` : nothing}
    ${coverLegend(s)}
    ${s.place ? placeOf(s.place) : nothing}
  `;
}

function measured(m: NonNullable<State['measure']>): string {
  if (m.way)
    return words.measured(fixed(m.way.distance_km, 2), bearing(m.way.azimuth_deg), bearing(m.way.back_azimuth_deg));
  return m.points.length === 1 ? words.measureSecond : words.measureFirst;
}

function placeOf(p: NonNullable<State['place']>) {
  return html`<ul class="map-word place" aria-label=${words.notations}>
    ${p.margin_db === undefined ? nothing : html`<li><b>${p.margin_db === null ? words.noCover : words.coverHere(margin(p.margin_db))}</b></li>`}
    <li>${p.ground_m === null ? words.noHeight : words.ground(fixed(p.ground_m, 0))}${p.cover_m ? words.coverAt(fixed(p.cover_m, 0)) : nothing}</li>
    <li>${p.decimal}</li><li>${p.dms}</li><li>${p.utm}</li>
  </ul>`;
}
