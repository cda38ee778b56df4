import { html, nothing } from 'lit';
import type { Antenna, Link, Plan } from './api';
import type { Asked } from './asked';
import { apart, azimuthCut, type Cut, elevationCut, peakOf } from './cuts';
import { bearing, fixed, megahertz, metres, signed } from './format';
import { notes, trouble } from './notices';
import { polarChart, type Toward } from './polar_chart';
import { stationOf } from './state';
import { vswrChart } from './vswr_chart';
import { words } from './words';

export interface AntennaProps {
  plan: Plan;
  link: Link;
  all: readonly Link[];
  end: 'from' | 'to';
  withMast: boolean;
  antenna: Asked<Antenna>;
}

export interface AntennaEvents {
  end(end: 'from' | 'to'): void;
  mast(shown: boolean): void;
}

/** The antenna of one end of the chosen link as it hangs there. */
export function antennaPanel(p: AntennaProps, on: AntennaEvents) {
  const found = stationOf(p.plan, p.link[p.end]);
  return html`
    <div class="row spread">
      ${endChoice(p.link, p.end, on.end)}
      ${
        found?.site.mast
          ? html`<label class="tick">
            <input type="checkbox" .checked=${p.withMast} @change=${() => on.mast(!p.withMast)} />${words.mastShown}
          </label>`
          : nothing
      }
    </div>
    ${trouble(p.antenna.problem)}
    ${
      p.antenna.value
        ? drawn(p, p.antenna.value, found?.station.above_ground_m)
        : html`<div class="ghost tall">${p.antenna.waiting ? words.antennaWaiting : nothing}</div>`
    }
  `;
}

export function endChoice(link: Link, end: 'from' | 'to', choose: (end: 'from' | 'to') => void) {
  return html`<div class="choice" role="group" aria-label=${words.endsOf}>
    ${(['from', 'to'] as const).map(
      (e) => html`<button aria-pressed=${e === end} @click=${() => choose(e)}>${link[e]}</button>`,
    )}
  </div>`;
}

function drawn(p: AntennaProps, a: Antenna, aboveM: number | undefined) {
  const towards = directionsFrom(p.link[p.end], p.all, p.link);
  const chosen = towards.find((t) => t.chosen) ?? { deg: a.mount.facing_deg, elevation: 0 };
  const flat = azimuthCut(a.pattern, chosen.elevation);
  const up = elevationCut(a.pattern, chosen.deg);
  const peak = Math.max(peakOf(flat.cut).dbi, peakOf(up.cut).dbi);
  const [best, bestUp] = [peakOf(flat.cut), peakOf(up.cut)];
  return html`
    <div aria-busy=${p.antenna.waiting}>
    <p class="hint">${words.antennaAt(a.name, metres(aboveM ?? 0))}, ${words.mhz(megahertz(a.frequency_hz))}</p>
    <div class="cuts">
      <figure>
        ${polarChart({ cut: flat.cut, compass: true, towards, peakDBi: peak, label: words.peak(fixed(best.dbi, 1), bearing(best.deg)) })}
        <figcaption>${words.horizontalCut}, ${words.cutAt(words.elevationHead.toLowerCase(), fixed(flat.at, 0))}</figcaption>
      </figure>
      <figure>
        ${polarChart({ cut: up.cut, compass: false, towards: inCut(towards, up.at), peakDBi: peak, label: words.peakUp(fixed(bestUp.dbi, 1), fixed(bestUp.deg > 180 ? bestUp.deg - 360 : bestUp.deg, 0)) })}
        <figcaption>${words.verticalCut}, ${words.cutAt(words.bearingHead.toLowerCase(), fixed(up.at, 0))}</figcaption>
      </figure>
    </div>
    ${figures(a)}
    <h3>${words.vswrCurve}</h3>
    ${vswrChart(a)}
    ${cutList(a)}
    ${cutTable(flat.cut, up.cut)}
    ${notes(words.warnings(a.warnings.length), a.warnings, true)}
    ${notes(words.remarks(a.notes.length), a.notes, false)}
    </div>
  `;
}

interface Departure extends Toward {
  elevation: number;
}

/** directionsFrom lists where the links of a station leave it, the chosen link among them. */
export function directionsFrom(station: string, all: readonly Link[], chosen: Link): Departure[] {
  return all.flatMap((l) => {
    const out = l.directions.find((d) => d.from === station);
    const back = l.directions.find((d) => d.to === station);
    if (l.from !== station && l.to !== station) return [];
    const deg = l.from === station ? l.azimuth_deg : l.back_azimuth_deg;
    return [
      {
        deg,
        elevation: out?.departure_deg ?? back?.arrival_deg ?? 0,
        name: l.from === station ? l.to : l.from,
        chosen: l === chosen,
      },
    ];
  });
}

// Directions within the plane of an elevation cut, to half its sampling.
const inCut = (towards: readonly Departure[], azimuthDeg: number): Toward[] =>
  towards.filter((t) => apart(t.deg, azimuthDeg) <= 2.5).map((t) => ({ ...t, deg: t.elevation }));

function figures(a: Antenna) {
  const { r, x } = a.impedance_ohm;
  const rows: [string, string][] = [
    [words.gain, words.dbi(signed(a.gain_dbi))],
    [words.impedance, words.ohm(fixed(r, 1), `${x < 0 ? '−' : '+'} j${Math.abs(x).toFixed(1)}`)],
    [words.vswr, words.vswrRef(fixed(a.vswr.value, 2), fixed(a.vswr.reference_ohm, 0))],
    [words.efficiency, `${fixed(a.efficiency * 100, 1)} %`],
  ];
  if (a.resonant_hz !== null) rows.push([words.resonance, words.mhz(fixed(a.resonant_hz / 1e6, 2))]);
  if (a.band_vswr2_hz) {
    const [lo, hi] = a.band_vswr2_hz;
    rows.push([words.band, words.bandOf(fixed(lo! / 1e6, 1), fixed(hi! / 1e6, 1))]);
  }
  return html`<dl class="facts">${rows.map(([k, v]) => html`<div><dt>${k}</dt><dd>${v}</dd></div>`)}</dl>`;
}

function cutList(a: Antenna) {
  if (a.cut.length === 0) return nothing;
  return html`<h3>${words.cutList}</h3>
    <table class="plain">
      <caption class="unseen">${words.cutList}</caption>
      <thead><tr><th scope="col">${words.part}</th><th scope="col" class="figure">${words.length}</th></tr></thead>
      <tbody>${a.cut.map((c) => html`<tr><th scope="row">${c.part}</th><td class="figure">${fixed(c.length_m * 1000, 1)}</td></tr>`)}</tbody>
    </table>`;
}

function cutTable(flat: Cut, up: Cut) {
  const rows = (cut: Cut, every: number) => cut.filter((c) => c.deg % every === 0);
  const table = (head: string, cut: Cut) => html`<table class="plain">
    <caption class="unseen">${head}</caption>
    <thead><tr><th scope="col">${head}</th><th scope="col" class="figure">${words.dbiHead}</th></tr></thead>
    <tbody>${rows(cut, 15).map((c) => html`<tr><th scope="row">${c.deg}°</th><td class="figure">${fixed(c.dbi, 1)}</td></tr>`)}</tbody>
  </table>`;
  return html`<details class="patterns"><summary>${words.patternTable}</summary>
    <div class="cuts">${table(words.bearingHead, flat)}${table(words.elevationHead, up)}</div>
  </details>`;
}
