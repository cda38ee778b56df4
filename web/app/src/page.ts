import { html, nothing } from 'lit';
import { addForms } from './add_forms';
import { antennaPanel, endChoice } from './antenna_panel';
import type { Link, Plan } from './api';
import { type BarEvents, bar } from './bar';
import type { Changes } from './changes';
import type { CoverDesk } from './cover';
import { coverPanel } from './cover_panel';
import { addLink, addSite, changeAntenna, placeSite, raiseAntenna, removeLink } from './edits';
import { bearing, fixed, metres } from './format';
import { heightsTable } from './heights_table';
import { ledgerTable, whatGives } from './ledger_table';
import { linksTable } from './links_table';
import type { MapPart } from './map';
import { mapTools } from './map_tools';
import { detail, notes, trouble } from './notices';
import { nearest } from './profile';
import { entered, type Mast, readOut, sectionChart } from './section_chart';
import { sectionTable } from './section_table';
import { sitesList } from './sites_list';
import { chosenLink, linkId, type State, stationOf } from './state';
import type { Store } from './store';
import { words } from './words';

/** The page is a function of the state: the bar, the map's place, the section and the tables at the side. */
export function page(
  store: Store<State>,
  changes: Changes,
  cover: CoverDesk,
  events: BarEvents,
  map: () => MapPart | undefined,
) {
  const s = store.get();
  const plan = s.plan.value;
  const link = chosenLink(s);
  return html`
    <a class="skip" href="#side" @click=${skip}>${words.skip}</a>
    ${bar(s, events)}
    <main>
      <section class="map" aria-label=${words.mapLabel}>
        <div id="map"></div>
        ${s.map === 'ready' ? mapTools(store, map()) : nothing}
        ${s.map === 'none' ? html`<p class="cover-note">${words.noMap}</p>` : nothing}
        ${s.map === 'waiting' ? html`<p class="cover-note quiet">${words.mapWaiting}</p>` : nothing}
      </section>
      <section class="strip" aria-labelledby="section-title">
        <h2 id="section-title" class="unseen">${words.section}</h2>
        ${strip(store, changes)}
      </section>
      <div class="side" id="side" tabindex="-1">
        ${fileTrouble(s)}
        ${trouble(s.plan.problem, { label: words.again, run: () => void changes.read() })}
        <div class="lasting">${trouble(s.trouble?.problem, wayOut(store, changes))}</div>
        <section aria-labelledby="links-title">
          <h2 id="links-title">${words.links}</h2>
          ${linksTable(plan, s.links, s.link, (id) => store.set({ link: id, way: 0, end: 'from' }))}
          ${trouble(s.links.problem)}
          ${s.links.value ? notes(words.remarks(s.links.value.notes?.length ?? 0), s.links.value.notes ?? [], false) : nothing}
        </section>
        ${plan && link ? ofLink(store, changes, plan, link) : plan && s.links.value ? html`<p class="hint">${words.noLinkChosen}</p>` : nothing}
        ${
          plan && plan.coverage.length > 0
            ? html`<section aria-labelledby="cover-title"><h2 id="cover-title">${words.coverage}</h2>${coverPanel(s, plan, cover)}</section>`
            : nothing
        }
        ${plan ? sites(store, changes, plan, map) : nothing}
      </div>
    </main>
    <p role="status" class="unseen">${s.said}</p>
  `;
}

function wayOut(store: Store<State>, changes: Changes) {
  if (store.get().trouble?.problem?.status === 409) return { label: words.discard, run: () => void changes.read() };
  return { label: words.dismiss, run: () => store.set({ trouble: undefined }) };
}

// The fragment holds the view: the link moves the focus by itself.
function skip(e: Event) {
  e.preventDefault();
  document.getElementById('side')?.focus();
}

function fileTrouble(s: State) {
  const list = s.plan.value?.file_problems ?? [];
  if (list.length === 0) return nothing;
  return html`<div class="trouble" role="alert"><p>${words.fileBroken(s.plan.value!.file)}</p><ul>${list.map(detail)}</ul></div>`;
}

function ofLink(store: Store<State>, changes: Changes, plan: Plan, link: Link) {
  const s = store.get();
  const found = stationOf(plan, link[s.end]);
  return html`
    <section aria-labelledby="ledger-title">
      <h2 id="ledger-title">${words.ledger} <span class="of">${words.ends(link.from, link.to)}</span></h2>
      ${ledgerTable(link, s.way, s.open, {
        turn: (way) => store.set({ way }),
        open: (open) => store.set({ open }),
      })}
      ${whatGives(link)}
      ${s.section.value ? sectionTable(s.section.value) : nothing}
    </section>
    <section aria-labelledby="antenna-title">
      <h2 id="antenna-title">${words.antenna}</h2>
      ${antennaPanel(
        { plan, link, all: s.links.value?.links ?? [], end: s.end, withMast: s.withMast, antenna: s.antenna },
        { end: (end) => store.set({ end }), mast: (withMast) => store.set({ withMast }) },
      )}
    </section>
    <section aria-labelledby="heights-title">
      <h2 id="heights-title">${words.heights}</h2>
      ${endChoice(link, s.end, (end) => store.set({ end }))}
      ${
        found
          ? heightsTable(
              {
                station: found.station.name,
                planned: { antenna: found.station.antenna, aboveM: found.station.above_ground_m },
                heights: s.heights,
              },
              (c) =>
                void changes.attempt(
                  [
                    ...(c.antenna === found.station.antenna
                      ? []
                      : changeAntenna(plan, found.station, c.antenna, otherSite(plan, link, s.end))),
                    ...raiseAntenna(found.site, found.station, c.height_m),
                  ],
                  words.tried(found.station.name, c.antenna, metres(c.height_m)),
                ),
            )
          : nothing
      }
    </section>
  `;
}

const otherSite = (plan: Plan, link: Link, end: 'from' | 'to') =>
  stationOf(plan, link[end === 'from' ? 'to' : 'from'])?.site.name;

function sites(store: Store<State>, changes: Changes, plan: Plan, map: () => MapPart | undefined) {
  const s = store.get();
  const planned = plan.links.findIndex((l) => linkId(l) === s.link);
  return html`<section aria-labelledby="sites-title">
    <h2 id="sites-title">${words.sites}</h2>
    ${sitesList(plan, new Set(), {
      place: (site, written) => void changes.attempt(placeSite(site, written), words.movedSite(site.name)),
      height: (site, st, m) => void changes.attempt(raiseAntenna(site, st, m), words.heightSet(st.name, metres(m))),
      antenna: (st, name) => {
        const l = plan.links.find((x) => x.from === st.name || x.to === st.name);
        const other = l && stationOf(plan, l.from === st.name ? l.to : l.from)?.site.name;
        void changes.attempt(changeAntenna(plan, st, name, other), words.antennaSet(st.name, name));
      },
      show: (site) => map()?.show(site),
    })}
    ${addForms(plan, map()?.middle() ?? plan.sites[0]?.place.decimal ?? '', {
      site: (site) => void changes.attempt(addSite(site), words.addedSite(site.name)),
      link: (from, to, channel) => void changes.attempt(addLink(from, to, channel), words.addedLink(from, to)),
    })}
    ${
      planned >= 0
        ? html`<button
            @click=${() => {
              const l = plan.links[planned]!;
              void changes.attempt(removeLink(planned), words.removedLink(words.ends(l.from, l.to)));
            }}
          >${words.removeLink}: ${words.ends(plan.links[planned]!.from, plan.links[planned]!.to)}</button>`
        : nothing
    }
  </section>`;
}

const sectionEnd = (m: Mast) => `${m.name}, ${words.m(metres(m.aboveM))}`;

function strip(store: Store<State>, changes: Changes) {
  const s = store.get();
  const section = s.section.value;
  if (s.section.problem) return trouble(s.section.problem);
  if (!section)
    return html`<div class="ghost fill">${s.section.waiting ? words.sectionWaiting : words.noLinkChosen}</div>`;
  const at = s.cursorKm === undefined ? undefined : section.points[nearest(section.points, s.cursorKm)];
  const masts = [section.from, section.to].map((name, end): Mast => {
    const p = end === 0 ? section.points[0]! : section.points.at(-1)!;
    return { name, aboveM: Math.round((p.ray_m - p.ground_m) * 100) / 100 };
  }) as [Mast, Mast];
  const heightOf = (end: 0 | 1, m: number) => {
    const found = stationOf(s.plan.value, masts[end].name);
    return found ? raiseAntenna(found.site, found.station, m) : [];
  };
  return html`
    <p class="ends">
      <b>${sectionEnd(masts[0])}</b>
      <span class="quiet">${words.sectionWay(fixed(section.distance_km, 2), bearing(section.azimuth_deg), bearing(section.back_azimuth_deg))}</span>
      <b>${sectionEnd(masts[1])}</b>
    </p>
    <div class="chart" id="section-box">
      ${
        s.sectionWidth > 0
          ? sectionChart(
              { section, masts, widthPx: s.sectionWidth, heightPx: s.sectionHeight, cursorKm: s.cursorKm },
              {
                cursor: (move) => store.set({ cursorKm: move(store.get().cursorKm) }),
                height: (end, m, done) => {
                  const edits = heightOf(end, m);
                  if (done) void changes.attempt(edits, words.heightSet(masts[end].name, metres(m)));
                  else changes.drag(edits, false);
                },
              },
            )
          : nothing
      }
    </div>
    <p class="readout">
      <span>${at ? readOut(at) : entered(section)}</span>
      <span class="legend" aria-hidden="true">
        <i class="k-ground"></i>${words.legendGround} <i class="k-cover"></i>${words.legendCover}
        <i class="k-bulge"></i>${words.legendBulge} <i class="k-zone"></i>${words.legendZone}
      </span>
    </p>
  `;
}
