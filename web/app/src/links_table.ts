import { html, nothing } from 'lit';
import type { Links, Plan } from './api';
import type { Asked } from './asked';
import { fixed, margin, percent } from './format';
import { verdict } from './marks';
import { linkId } from './state';
import { words } from './words';

/** The links as a table: what the map shows of them, and every end as the plan names it before they are worked out. */
export function linksTable(
  plan: Plan | undefined,
  links: Asked<Links>,
  chosen: string | undefined,
  choose: (id: string) => void,
) {
  const rows = links.value?.links;
  if (!plan) return html`<div class="ghost" aria-hidden="true"></div>`;
  if (plan.links.length === 0) return html`<p class="hint">${words.noLinks}</p>`;
  return html`
    <table class="links" aria-busy=${links.waiting}>
      <caption class="unseen">${words.links}</caption>
      <thead>
        <tr>
          <th scope="col">${words.link}</th>
          <th scope="col" class="figure">${words.distance}</th>
          <th scope="col" class="figure">${words.margin}</th>
          <th scope="col" class="figure of-chance">${words.chance}</th>
          <th scope="col">${words.result}</th>
        </tr>
      </thead>
      <tbody>
        ${plan.links.map((planned, i) => {
          const id = linkId(planned);
          const l = rows?.find((r) => linkId(r) === id) ?? rows?.[i];
          return html`<tr class=${id === chosen ? 'chosen' : ''}>
            <th scope="row">
              <button class="pick" aria-pressed=${id === chosen} @click=${() => choose(id)}>
                <span>${planned.from}</span><span class="to">${planned.to}</span>
              </button>
            </th>
            ${
              l
                ? html`<td class="figure">${fixed(l.distance_km, 2)}</td>
                  <td class="figure">${margin(l.margin_db)}</td>
                  <td class="figure of-chance">${percent(l.chance)}</td>
                  <td>${verdict(l.verdict)}</td>`
                : html`<td colspan="4" class="waiting">${links.waiting ? words.waitingLinks : nothing}</td>`
            }
          </tr>`;
        })}
      </tbody>
    </table>
  `;
}
