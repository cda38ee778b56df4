import { html } from 'lit';
import type { Section } from './api';
import { fixed } from './format';
import { groundLine, nearest, type Point, ratioAt } from './profile';
import { words } from './words';

const rows = 20;

/** The section in figures: evenly spaced points and the worst one. */
export function sectionTable(s: Section) {
  const worst = nearest(s.points, s.clearance.at_km);
  const last = s.points.length - 1;
  const shown = new Set(Array.from({ length: rows + 1 }, (_, i) => Math.round((i / rows) * last)).concat(worst));
  return html`<details class="patterns"><summary>${words.sectionTable}</summary>
    <table class="plain">
      <caption class="unseen">${words.sectionLabel(s.from, s.to)}</caption>
      <thead><tr>
        <th scope="col" class="figure">${words.distance}</th>
        <th scope="col" class="figure">${words.groundHead}</th>
        <th scope="col" class="figure">${words.coverHead}</th>
        <th scope="col" class="figure">${words.rayHead}</th>
        <th scope="col" class="figure">${words.ratioHead}</th>
      </tr></thead>
      <tbody>${[...shown].sort((a, b) => a - b).map((i) => row(s.points[i]!, i === worst))}</tbody>
    </table>
  </details>`;
}

function row(p: Point, worst: boolean) {
  const ratio = ratioAt(p);
  return html`<tr class=${worst ? 'chosen' : ''}>
    <th scope="row" class="figure">${fixed(p.d_km, 2)}</th>
    <td class="figure">${fixed(p.ground_m, 0)}</td>
    <td class="figure">${fixed(p.cover_m, 0)}</td>
    <td class="figure">${fixed(p.ray_m - groundLine(p), 1)}</td>
    <td class="figure">${ratio === undefined ? '–' : fixed(ratio, 2)}${worst ? ` ${words.worstHere}` : ''}</td>
  </tr>`;
}
