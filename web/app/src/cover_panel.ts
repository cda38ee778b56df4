import { html, nothing } from 'lit';
import type { CoverJob, Plan } from './api';
import type { CoverDesk, CoverShown } from './cover';
import { fixed, metres } from './format';
import { trouble } from './notices';
import type { State } from './state';
import { words } from './words';

/** The coverage maps that the plan asks for: made on demand, shown as shades or bands, measured in a table. */
export function coverPanel(s: State, plan: Plan, desk: CoverDesk) {
  const job = s.cover?.job;
  return html`
    ${plan.coverage.map(
      (c) => html`<p class="row">
        <button ?disabled=${job?.state === 'running'} @click=${() => void desk.start(c.site)}>${words.mapCoverage(c.site)}</button>
        <span class="quiet">${words.coverRange(metres(c.range_km))}</span>
      </p>`,
    )}
    ${job?.state === 'running' ? progress(job, desk) : nothing}
    ${job?.state === 'failed' ? trouble({ title: '', status: 0, detail: job.problem ?? words.coverState.failed }) : nothing}
    ${job?.state === 'cancelled' ? html`<p class="hint">${words.coverState.cancelled}</p>` : nothing}
    ${job?.result ? result(s, job, job.result, desk) : nothing}
  `;
}

function progress(job: CoverJob, desk: CoverDesk) {
  return html`<div class="row">
    <progress max=${Math.max(1, job.total)} .value=${job.done} aria-label=${words.coverDone}></progress>
    <span>${job.total > 0 ? words.radials(job.done, job.total) : words.coverState.running}</span>
    <button @click=${() => void desk.cancel()}>${words.cancel}</button>
  </div>`;
}

function result(s: State, job: CoverJob, r: NonNullable<CoverJob['result']>, desk: CoverDesk) {
  const kinds: CoverShown[] = ['margin', 'bands', 'none'];
  return html`
    ${job.version !== s.version ? html`<p class="hint">${words.coverStale}</p>` : nothing}
    <div class="choice" role="group" aria-label=${words.coverShow}>
      ${kinds.map((k) => html`<button aria-pressed=${s.cover?.shown === k} @click=${() => void desk.show(k)}>${words.coverShown[k]}</button>`)}
    </div>
    <table class="plain">
      <caption>${words.coverOf(job.site)}</caption>
      <thead><tr><th scope="col">${words.marginOf}</th><th scope="col" class="figure">${words.area}</th></tr></thead>
      <tbody>
        ${r.bands.map(
          (b) => html`<tr>
            <th scope="row">${b.to_db === null ? words.bandFrom(fixed(b.from_db, 0)) : words.bandTo(fixed(b.from_db, 0), fixed(b.to_db, 0))}</th>
            <td class="figure">${fixed(b.area_km2, 1)}</td>
          </tr>`,
        )}
      </tbody>
    </table>
    <p class="hint">
      ${words.sampling(r.check.samples, fixed(r.check.cell_median_db, 2), fixed(r.check.cell_p95_db, 1), fixed(r.check.cell_max_db, 1))}
    </p>
    <p>
      <a href=${`./api/coverage/${job.id}/bands`} download>${words.download.bands}</a>,
      <a href=${`./api/coverage/${job.id}/margin.tif`} download>${words.download.marginRaster}</a>,
      <a href=${`./api/coverage/${job.id}/loss.tif`} download>${words.download.lossRaster}</a>
    </p>
  `;
}

/** coverLegend names the shades on the map in decibels. */
export function coverLegend(s: State) {
  const r = s.cover?.job.result;
  if (!r || s.cover?.shown === 'none') return nothing;
  if (s.cover?.shown === 'bands') {
    return html`<ul class="map-word key" aria-label=${words.coverLegend}>
      <li class="head">${words.marginOf}</li>
      ${r.bands.toReversed().map((b, i) => html`<li><i class="hatch h${r.bands.length - 1 - i}"></i>${words.bandFrom(fixed(b.from_db, 0))}</li>`)}
    </ul>`;
  }
  return html`<ul class="map-word key" aria-label=${words.coverLegend}>
    <li class="head">${words.marginOf}</li>
    ${r.legend.toReversed().map((l, i) => html`<li><i class="s${r.legend.length - 1 - i}"></i>${words.bandFrom(fixed(l.from_db, 0))}</li>`)}
  </ul>`;
}
