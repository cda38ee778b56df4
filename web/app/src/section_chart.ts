import { html, nothing, svg } from 'lit';
import { ref as placed } from 'lit/directives/ref.js';
import type { Section } from './api';
import { fixed, metres } from './format';
import { coverLine, enteredKm, groundLine, nearest, type Point, ratioAt, reach } from './profile';
import { type Scale, scale, stepFor, ticks } from './scale';
import { words } from './words';

/** A Mast is an end of the section, its antenna draggable up and down. */
export interface Mast {
  name: string;
  aboveM: number;
}

export interface SectionProps {
  section: Section;
  masts: readonly [Mast, Mast];
  widthPx: number;
  heightPx: number;
  cursorKm: number | undefined;
}

export interface SectionEvents {
  cursor(move: (km: number | undefined) => number | undefined): void;
  /** An end's antenna is being dragged, or has been let go. */
  height(end: 0 | 1, aboveM: number, done: boolean): void;
}

const margins = { left: 46, right: 18, top: 22, bottom: 22 };

/** The ground under a link, the ray above it and its first Fresnel zone; the whole is a slider along the path. */
export function sectionChart(p: SectionProps, on: SectionEvents) {
  const { section, widthPx, heightPx } = p;
  const points = section.points;
  const { least, most } = reach(points);
  const step = stepFor(most - least || 1, 5);
  const x = scale(0, section.distance_km, margins.left, widthPx - margins.right);
  const y = scale(least, Math.max(most, least + step), heightPx - margins.bottom, margins.top);
  const at = p.cursorKm === undefined ? undefined : points[nearest(points, p.cursorKm)];
  const stepKm = section.distance_km / (points.length - 1);
  const keys = (e: KeyboardEvent) => {
    const move = cursorMove(e, stepKm * Math.max(1, Math.round(points.length / 200)), section.distance_km);
    if (!move) return;
    e.preventDefault();
    on.cursor(move);
  };
  const hover = (e: PointerEvent) => {
    const box = (e.currentTarget as SVGElement).getBoundingClientRect();
    const km = Math.min(section.distance_km, Math.max(0, x.invert(e.clientX - box.left)));
    on.cursor(() => km);
  };
  return html`
    <svg
      class="section" width=${widthPx} height=${heightPx} viewBox="0 0 ${widthPx} ${heightPx}"
      role="slider" tabindex="0"
      aria-label=${words.sectionLabel(section.from, section.to)} aria-description=${words.sectionKeys}
      aria-valuemin="0" aria-valuemax=${section.distance_km.toFixed(2)} aria-valuenow=${(p.cursorKm ?? 0).toFixed(2)}
      aria-valuetext=${at ? readOut(at) : entered(section)}
      @keydown=${keys} @pointermove=${hover} @pointerdown=${hover} @pointerleave=${() => on.cursor(() => undefined)}
    >
      <title>${entered(section)}</title>
      ${axes(x, y, step, least, most, section.distance_km, widthPx, heightPx)}
      <clipPath id="plot"><rect x=${margins.left} y="0" width=${widthPx - margins.left - margins.right} height=${heightPx - margins.bottom} /></clipPath>
      ${layers(points, x, y, heightPx - margins.bottom)}
      ${worstMark(section, x, y)}
      ${ends(section, x, y)}
      ${at ? cursor(at, x, y, heightPx) : nothing}
    </svg>
    ${p.masts.map((mast, end) => handle(section, mast, end as 0 | 1, x, y, on))}
  `;
}

/** readOut says in words what stands under the cursor. */
export function readOut(p: Point): string {
  const over = p.ray_m - groundLine(p);
  const ratio = ratioAt(p);
  return (
    words.cursor(
      fixed(p.d_km, 2),
      fixed(p.ground_m, 0),
      over < 0 ? words.below(fixed(-over, 1)) : words.above(fixed(over, 1)),
      ratio === undefined ? '–' : fixed(ratio, 2),
    ) + (p.cover_m > 0 ? words.coverAt(fixed(p.cover_m, 0)) : '')
  );
}

/** entered says how much of the path enters the zone that should be clear. */
export function entered(s: Section): string {
  const km = enteredKm(s.points, s.clearance.needed_ratio);
  return km > 0 ? words.entered(fixed(km, 2)) : words.clear;
}

// Moves are functions of where the cursor is then: three quick presses move three steps, whatever has been drawn.
function cursorMove(e: KeyboardEvent, stepKm: number, lengthKm: number) {
  const by = (km: number) => (at: number | undefined) => Math.min(lengthKm, Math.max(0, (at ?? 0) + km));
  const step = stepKm * (e.shiftKey ? 10 : 1);
  switch (e.key) {
    case 'ArrowRight':
    case 'ArrowUp':
      return by(step);
    case 'ArrowLeft':
    case 'ArrowDown':
      return by(-step);
    case 'PageUp':
      return by(10 * stepKm);
    case 'PageDown':
      return by(-10 * stepKm);
    case 'Home':
      return () => 0;
    case 'End':
      return () => lengthKm;
    case 'Escape':
      return () => undefined;
  }
  return undefined;
}

function axes(
  x: Scale,
  y: Scale,
  step: number,
  least: number,
  most: number,
  km: number,
  width: number,
  height: number,
) {
  const kmStep = stepFor(km, Math.max(2, width / 130));
  const lastKm = x(km) - 62;
  return svg`
    <g class="axis">
      <text x="4" y="13">${words.masl}</text>
      ${ticks(least, most, step).map(
        (t) => svg`<line x1=${margins.left} x2=${width - margins.right} y1=${y(t)} y2=${y(t)} />
          <text x=${margins.left - 6} y=${y(t) + 4} text-anchor="end">${fixed(t, step < 1 ? 1 : 0)}</text>`,
      )}
      ${ticks(0, km, kmStep)
        .filter((t) => x(t) < lastKm)
        .map((t) => svg`<text x=${x(t)} y=${height - 6} text-anchor="middle">${fixed(t, kmStep < 1 ? 1 : 0)}</text>`)}
      <text x=${x(km)} y=${height - 6} text-anchor="end">${words.km(fixed(km, 1))}</text>
    </g>`;
}

type Height = (p: Point) => number;

function layers(points: readonly Point[], x: Scale, y: Scale, floorPx: number) {
  const run = (h: Height, list: readonly Point[] = points) =>
    list.map((p) => `${x(p.d_km).toFixed(1)} ${y(h(p)).toFixed(1)}`).join('L');
  const back = points.toReversed();
  const band = (upper: Height, lower: Height) => `M${run(upper)}L${run(lower, back)}Z`;
  const around = (part: number): [Height, Height] => [
    (p) => p.ray_m + part * p.fresnel1_m,
    (p) => p.ray_m - part * p.fresnel1_m,
  ];
  const whole = around(1);
  const floor = `${x(points.at(-1)!.d_km).toFixed(1)} ${floorPx}L${x(0).toFixed(1)} ${floorPx}Z`;
  const bulge = scale(0, 1, floorPx, floorPx + y(1) - y(0));
  return svg`<g clip-path="url(#plot)">
    <path class="zone" d=${band(...around(0.6))} />
    <path class="cover" d=${band(coverLine, groundLine)} />
    <path class="ground" d=${`M${run(groundLine)}L${floor}`} />
    <path class="bulge" d=${`M${points.map((p) => `${x(p.d_km).toFixed(1)} ${bulge(p.bulge_m).toFixed(1)}`).join('L')}Z`} />
    <path class="whole" d=${`M${run(whole[0])}M${run(whole[1])}`} />
    <path class="ray" d=${`M${run((p) => p.ray_m, [points[0]!, points.at(-1)!])}`} /></g>`;
}

function worstMark(s: Section, x: Scale, y: Scale) {
  const p = s.points[nearest(s.points, s.clearance.at_km)];
  if (!p) return nothing;
  const px = x(p.d_km);
  const label = words.worst(fixed(s.clearance.worst_ratio, 2), fixed(s.clearance.at_km, 2));
  const left = p.d_km > s.distance_km / 2;
  return svg`<g class="worst">
    <line x1=${px} x2=${px} y1=${y(coverLine(p))} y2=${y(p.ray_m)} />
    <circle cx=${px} cy=${y(coverLine(p))} r="3.5" />
    <text x=${px + (left ? -8 : 8)} y=${margins.top - 8} text-anchor=${left ? 'end' : 'start'}>${label}</text>
    <line class="lead" x1=${px} x2=${px} y1=${margins.top - 12} y2=${Math.min(y(coverLine(p)), y(p.ray_m))} />
  </g>`;
}

function ends(s: Section, x: Scale, y: Scale) {
  return [s.points[0]!, s.points.at(-1)!].map(
    (p) => svg`<line class="mast" x1=${x(p.d_km)} x2=${x(p.d_km)} y1=${y(p.ground_m)} y2=${y(p.ray_m)} />`,
  );
}

function cursor(p: Point, x: Scale, y: Scale, height: number) {
  return svg`<g class="cursor">
    <line x1=${x(p.d_km)} x2=${x(p.d_km)} y1=${margins.top - 6} y2=${height - margins.bottom} />
    <circle cx=${x(p.d_km)} cy=${y(groundLine(p))} r="4.5" />
  </g>`;
}

// Heights are set in half metres by the pointer and whole ones by keys.
function handle(s: Section, mast: Mast, end: 0 | 1, x: Scale, y: Scale, on: SectionEvents) {
  const p = end === 0 ? s.points[0]! : s.points.at(-1)!;
  const place = (el: Element | undefined) => {
    if (!(el instanceof HTMLElement)) return;
    el.style.left = `${x(p.d_km)}px`;
    el.style.top = `${y(p.ray_m)}px`;
  };
  const set = (m: number, done: boolean) => on.height(end, Math.max(0.5, m), done);
  const grab = (e: PointerEvent) => {
    const knob = e.currentTarget as HTMLElement;
    const perPx = Math.abs(y.invert(1) - y.invert(0));
    const at = (moved: PointerEvent) => Math.round((mast.aboveM + (e.clientY - moved.clientY) * perPx) * 2) / 2;
    knob.setPointerCapture(e.pointerId);
    knob.onpointermove = (moved) => set(at(moved), false);
    const end = (m: number) => {
      knob.onpointermove = null;
      knob.onpointerup = null;
      knob.onpointercancel = null;
      set(m, true);
    };
    knob.onpointerup = (moved) => end(at(moved));
    knob.onpointercancel = () => end(mast.aboveM);
    e.preventDefault();
    knob.focus();
  };
  const keys = (e: KeyboardEvent) => {
    const by = { ArrowUp: 1, ArrowDown: -1, PageUp: 5, PageDown: -5 }[e.key];
    if (by === undefined) return;
    e.preventDefault();
    set(mast.aboveM + by * (e.shiftKey ? 5 : 1), true);
  };
  return html`<button
    class="knob" role="slider" aria-orientation="vertical"
    aria-label=${words.heightAt(mast.name)} aria-valuenow=${mast.aboveM} aria-valuemin="0.5" aria-valuemax="1000"
    aria-valuetext=${words.aboveGround(metres(mast.aboveM))} title=${words.heightAt(mast.name)}
    @pointerdown=${grab} @keydown=${keys} ${placed(place)}
  ></button>`;
}
