import { html, svg } from 'lit';
import type { Verdict } from './api';
import { words } from './words';

/** The verdict's mark: a disc, a half and a ring, drawn so that every machine shows the same. */
export function markShape(v: Verdict) {
  const ring = svg`<circle cx="6" cy="6" r="4.6" fill="none" stroke="currentColor" stroke-width="1.5" />`;
  if (v === 'closes') return svg`<circle cx="6" cy="6" r="5.3" fill="currentColor" />`;
  if (v === 'thin') return svg`${ring}<path d="M6 1.4a4.6 4.6 0 0 0 0 9.2z" fill="currentColor" />`;
  return ring;
}

export const mark = (v: Verdict) =>
  html`<svg class="mark" viewBox="0 0 12 12" width="12" height="12" aria-hidden="true">${markShape(v)}</svg>`;

/** verdict is the mark with its word, in its colour. */
export const verdict = (v: Verdict) =>
  html`<span class="verdict ${v}" title=${words.verdictMeaning[v]}>${mark(v)} ${words.verdict[v]}</span>`;
