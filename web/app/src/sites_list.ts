import { html, nothing } from 'lit';
import type { Plan, Site, Station } from './api';
import { fixed, metres } from './format';
import { words } from './words';

export interface SiteEvents {
  place(site: Site, written: string): void;
  height(site: Site, station: Station, aboveM: number): void;
  antenna(station: Station, antenna: string): void;
  show(site: Site): void;
}

/** The sites with what can be changed at them: all that the map can do to a site, in words. */
export function sitesList(plan: Plan, opened: ReadonlySet<string>, on: SiteEvents) {
  return html`<div class="sites">
    ${plan.sites.map(
      (site) => html`<details ?open=${opened.has(site.name)}>
        <summary>
          <b>${site.name}</b>
          <span class="quiet">${site.ground_m === null ? words.noHeight : words.ground(fixed(site.ground_m, 0))}${site.surveyed ? `, ${words.surveyed}` : ''}</span>
        </summary>
        <div class="fields">
          <label>${words.place}
            <input .value=${site.at} aria-description=${words.placeHint} @change=${(e: Event) => on.place(site, (e.target as HTMLInputElement).value)} />
          </label>
          <ul class="notations" aria-label=${words.notations}>
            <li>${site.place.decimal}</li><li>${site.place.dms}</li><li>${site.place.utm}</li>
          </ul>
          <p class="quiet">${words.mastHead}: ${site.mast ? words.mastOf(site.mast.kind, metres(site.mast.height_m)) : words.noMast}</p>
          ${site.stations.map((st) => station(plan, site, st, on))}
          <button @click=${() => on.show(site)}>${words.showOnMap}</button>
        </div>
      </details>`,
    )}
  </div>`;
}

function station(plan: Plan, site: Site, st: Station, on: SiteEvents) {
  return html`<fieldset>
    ${site.stations.length > 1 ? html`<legend>${st.name}</legend>` : html`<legend class="unseen">${st.name}</legend>`}
    <label>${words.antennaHead}
      <select @change=${(e: Event) => on.antenna(st, (e.target as HTMLSelectElement).value)}>
        ${plan.antennas.map((a) => html`<option .selected=${a.name === st.antenna}>${a.name}</option>`)}
      </select>
    </label>
    <label>${words.aboveHead}
      <input
        type="number" min="0.5" max="1000" step="0.5" .value=${metres(st.above_ground_m)}
        @change=${(e: Event) => {
          const m = (e.target as HTMLInputElement).valueAsNumber;
          if (m >= 0.5) on.height(site, st, m);
        }}
      />
    </label>
    ${st.feeder ? html`<p class="quiet">${words.feederOf(st.feeder, metres(st.feeder_length_m))}</p>` : nothing}
  </fieldset>`;
}
