import { html } from 'lit';
import type { Plan } from './api';
import { hasBeam, type NewSite } from './edits';
import { words } from './words';

export interface AddEvents {
  site(s: NewSite): void;
  link(from: string, to: string, channel: string): void;
}

/** Forms for a new site and a new link; a new site's place is the middle of the map until it is written over. */
export function addForms(plan: Plan, middle: string, on: AddEvents) {
  const stations = plan.sites.flatMap((s) => s.stations.map((st) => st.name));
  // One without a beam can be added without saying where it faces.
  const plain = plan.antennas.find((a) => !hasBeam(a.kind)) ?? plan.antennas[0];
  const options = (names: readonly string[]) => names.map((n) => html`<option>${n}</option>`);
  const sent = (f: (data: FormData) => void) => (e: SubmitEvent) => {
    e.preventDefault();
    const form = e.target as HTMLFormElement;
    f(new FormData(form));
    form.reset();
    (form.closest('details') as HTMLDetailsElement).open = false;
  };
  const text = (data: FormData, key: string) => String(data.get(key) ?? '').trim();
  return html`
    <details class="add"><summary>${words.addSite}</summary>
      <form class="fields" @submit=${sent((data) =>
        on.site({
          name: text(data, 'name'),
          at: text(data, 'at') || middle,
          radio: text(data, 'radio'),
          antenna: text(data, 'antenna'),
          toward: text(data, 'toward'),
          heightM: Number(data.get('height')),
        }),
      )}>
        <label>${words.name}<input name="name" required maxlength="100" /></label>
        <label>${words.place}<input name="at" placeholder=${middle} aria-description=${words.placeHint} /></label>
        <label>${words.radio}<select name="radio">${options(plan.radios)}</select></label>
        <label>${words.antennaHead}<select name="antenna">${plan.antennas.map((a) => html`<option ?selected=${a === plain}>${a.name}</option>`)}</select></label>
        <label>${words.facing}<select name="toward"><option value="">${words.facingNone}</option>${options(plan.sites.map((x) => x.name))}</select></label>
        <label>${words.aboveHead}<input name="height" type="number" min="0.5" max="1000" step="0.5" value="4" required /></label>
        <button>${words.add}</button>
      </form>
    </details>
    <details class="add"><summary>${words.addLink}</summary>
      <form class="fields" @submit=${sent((data) => on.link(text(data, 'from'), text(data, 'to'), text(data, 'channel')))}>
        <label>${words.from}<select name="from">${options(stations)}</select></label>
        <label>${words.to}<select name="to">${options(stations)}</select></label>
        <label>${words.channel}<select name="channel">${options(plan.channels.map((c) => c.name))}</select></label>
        <button>${words.add}</button>
      </form>
    </details>
  `;
}
