import { html } from 'lit';
import type { Asked } from './asked';
import { margin, metres } from './format';
import { byHeight, type Cell, shadeOf, type Weighed } from './heights';
import { mark } from './marks';
import { notes, trouble } from './notices';
import { words } from './words';

export interface HeightsProps {
  station: string;
  planned: { antenna: string; aboveM: number };
  heights: Asked<Weighed>;
}

/** Height against antenna: the worst margin of the station's links in each cell, a cell chosen is tried. */
export function heightsTable(p: HeightsProps, attempt: (c: Cell) => void) {
  if (p.heights.problem) return trouble(p.heights.problem);
  if (!p.heights.value) return html`<div class="ghost tall">${words.heightsWaiting}</div>`;
  const rows = byHeight(p.heights.value.cells);
  const columns = rows[0]?.cells.map((c) => c.antenna) ?? [];
  return html`
    <p class="hint">${words.heightsNote}</p>
    <div class="wide"><table class="heights" aria-busy=${p.heights.waiting}>
      <caption class="unseen">${words.heightsOf(p.station)}</caption>
      <thead>
        <tr><th scope="col">${words.heightHead}</th>${columns.map((a) => html`<th scope="col">${a}</th>`)}</tr>
      </thead>
      <tbody>
        ${rows.map(
          (row) => html`<tr>
            <th scope="row">${words.m(metres(row.heightM))}</th>
            ${row.cells.map((c) => cell(c, p, attempt))}
          </tr>`,
        )}
      </tbody>
    </table></div>
    ${notes(
      words.impossible(p.heights.value.impossible.length),
      p.heights.value.impossible.map((x) => x.why),
      false,
    )}
  `;
}

function cell(c: Cell, p: HeightsProps, attempt: (c: Cell) => void) {
  const planned = c.antenna === p.planned.antenna && Math.abs(c.height_m - p.planned.aboveM) < 1e-6;
  const label = words.tryCell(
    metres(c.height_m),
    c.antenna,
    margin(c.margin_db),
    words.verdict[c.verdict],
    c.worst_link,
  );
  return html`<td>
    <button class="shade s${shadeOf(c.margin_db)}" aria-pressed=${planned} aria-label=${label} title=${label} @click=${() => attempt(c)}>
      ${mark(c.verdict)} ${margin(c.margin_db)}
    </button>
  </td>`;
}
