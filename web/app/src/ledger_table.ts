import { html, nothing, svg } from 'lit';
import type { Direction, Link } from './api';
import { fixed, margin, percent, signed } from './format';
import { type Bar, type Ledger, ledgerOf, type Owner, partsOf } from './ledger';
import { verdict } from './marks';
import { notes } from './notices';
import { words } from './words';

export interface LedgerEvents {
  turn(way: 0 | 1): void;
  /** Shows the sources of these lines and no others. */
  open(names: ReadonlySet<string>): void;
}

/** The budget of one direction as steps: a table whose rows draw themselves, each source shown on demand. */
export function ledgerTable(link: Link, way: 0 | 1, open: ReadonlySet<string>, on: LedgerEvents) {
  const d = link.directions[way] ?? link.directions[0]!;
  const l = ledgerOf(d);
  const decides = d.margin_db === link.margin_db;
  const all = named(d).every((n) => open.has(n));
  return html`
    <div class="row spread">
      ${directions(link, way, on)}
      <label class="tick">
        <input type="checkbox" .checked=${all} @change=${() => on.open(new Set(all ? [] : link.directions.flatMap(named)))} />
        ${words.showSources}
      </label>
    </div>
    <table class="ledger">
      <caption class="unseen">${words.ledgerOf(d.from, d.to)}</caption>
      <colgroup><col class="names" /><col class="bars" /><col class="values" /></colgroup>
      <thead>
        <tr><th scope="col">${words.step}</th><td></td><th scope="col" class="figure">${words.value}</th></tr>
      </thead>
      ${partsOf(d).map(
        (part) => html`<tbody>
          <tr class="part"><th scope="rowgroup" colspan="3">${ownerName(d, part.owner)}</th></tr>
          ${part.lines.map(({ line, name, index }) => {
            const shown = open.has(line.name);
            return html`<tr class="step ${line.value_db < 0 ? 'down' : 'up'}">
                <th scope="row">
                  <button class="plain" aria-expanded=${shown} @click=${() => on.open(toggled(open, line.name))}>
                    ${name}
                  </button>
                </th>
                <td class="bar">${bar(l, l.bars[index]!, index)}</td>
                <td class="figure">${signed(line.value_db)}</td>
              </tr>
              ${
                shown
                  ? html`<tr class="source"><td colspan="3">
                      ${words.fromSource(words.kind[line.kind], line.source)}
                      <span class="sum">${words.running(fixed(l.sums[index]!, 1))}</span>
                    </td></tr>`
                  : nothing
              }`;
          })}
        </tbody>`,
      )}
      <tfoot>
        <tr class="step total ${decides ? link.verdict : ''}">
          <th scope="row">${words.marginOf} ${decides ? verdict(link.verdict) : html`<span class="quiet">${words.otherDecides}</span>`}</th>
          <td class="bar">${bar(l, l.margin, d.lines.length)}</td>
          <td class="figure">${words.db(margin(d.margin_db))}</td>
        </tr>
      </tfoot>
    </table>
    <dl class="facts">
      <div><dt>${words.received}</dt><dd>${words.dbm(fixed(d.received_dbm, 1))}</dd></div>
      <div><dt>${words.required}</dt><dd>${words.dbm(fixed(d.required_dbm, 1))}</dd></div>
    </dl>
  `;
}

const named = (d: Direction) => d.lines.map((line) => line.name);

function directions(link: Link, way: 0 | 1, on: LedgerEvents) {
  return html`<div class="choice" role="group" aria-label=${words.directions}>
    ${link.directions.map(
      (d, i) => html`<button aria-pressed=${i === way} @click=${() => on.turn(i as 0 | 1)}>
        <span class="unseen">${d.from}</span>${words.wayTo(d.to)} <span class="quiet">${margin(d.margin_db)}</span>
      </button>`,
    )}
  </div>`;
}

function ownerName(d: Direction, owner: Owner): string {
  switch (owner) {
    case 'from':
      return words.sends(d.from);
    case 'to':
      return words.receives(d.to);
    default:
      return words[owner];
  }
}

function toggled(open: ReadonlySet<string>, name: string): ReadonlySet<string> {
  const next = new Set(open);
  if (!next.delete(name)) next.add(name);
  return next;
}

// Places across are in percent of the cell, so that the bars need not know its width; the drawing fills rows of any
// height, and a dotted line leads from each step's end to the next step.
function bar(l: Ledger, b: Bar, index: number) {
  const span = l.most - l.least || 1;
  const across = (db: number) => `${((db - l.least) / span) * 100}%`;
  const wide = Math.abs(b.to - b.from);
  const [zero, from, to] = [across(l.margin.from), across(b.from), across(b.to)];
  const total = index === l.bars.length;
  return html`<svg class="steps" aria-hidden="true">
    <line class="zero" x1=${zero} x2=${zero} y1="0" y2="100%" />
    ${index > 0 ? svg`<line class="joint" x1=${total ? to : from} x2=${total ? to : from} y1="0" y2="5" />` : nothing}
    ${total ? nothing : svg`<line class="joint" x1=${to} x2=${to} y1="18" y2="100%" />`}
    <rect x=${across(Math.min(b.from, b.to))} y="5" width=${`${(wide / span) * 100}%`} height="13" />
    ${(wide / span) * 100 < 0.6 ? svg`<line class="none" x1=${to} x2=${to} y1="5" y2="18" />` : nothing}
    ${b.cut ? svg`<svg class="cut" x=${across((b.from + b.to) / 2)} y="3"><path d="M-4 17 2 0M1 17 7 0" /></svg>` : nothing}
  </svg>`;
}

/** What one metre or one decibel more would give, as the server found it by computing the link again. */
export function whatGives(link: Link) {
  const s = link.sensitivity;
  const rows = [
    [words.mastGives(link.from), words.db(signed(s.from_mast_1m_db, 2))],
    [words.mastGives(link.to), words.db(signed(s.to_mast_1m_db, 2))],
    [words.groundGives, words.db(signed(s.ground_4m_higher_db, 2))],
    [words.decibelGives, words.points(signed(s.chance_of_1_db * 100))],
  ];
  return html`
    <h3>${words.gives}</h3>
    <dl class="gives">${rows.map(([what, gives]) => html`<div><dt>${what}</dt><dd>${gives}</dd></div>`)}</dl>
    <p class="chance">${words.chanceIs(percent(link.chance))}</p>
    ${notes(words.warnings(link.warnings.length), link.warnings, true)}
  `;
}
