import { html, nothing } from 'lit';
import type { Problem, ProblemDetail } from './api';
import { words } from './words';

/** trouble shows what the server refused, with the plan's lines where it names them, and what can be done about it. */
export function trouble(problem: Problem | undefined, action?: { label: string; run(): void }) {
  if (!problem) return nothing;
  const list = problem.errors ?? [];
  return html`<div class="trouble" role="alert">
    ${list.length > 0 ? html`<ul>${list.map(detail)}</ul>` : html`<p>${problem.detail}</p>`}
    ${action ? html`<button @click=${action.run}>${action.label}</button>` : nothing}
  </div>`;
}

export function detail(d: ProblemDetail) {
  return html`<li>
    ${d.line ? html`<b>${words.line(d.line)}</b> ` : nothing}${d.field ? html`<code>${d.field}</code> ` : nothing}${d.message}
    ${d.hint ? html`<br /><span class="quiet">${d.hint}</span>` : nothing}
  </li>`;
}

/** notes shows warnings openly and remarks on demand. */
export function notes(title: string, texts: readonly string[], openly: boolean) {
  if (texts.length === 0) return nothing;
  return html`<details class="notes" ?open=${openly}>
    <summary>${title}</summary>
    <ul>${texts.map((t) => html`<li>${t}</li>`)}</ul>
  </details>`;
}
