import { html, svg } from 'lit';
import type { Antenna } from './api';
import { fixed, megahertz } from './format';
import { scale, stepFor, ticks } from './scale';
import { words } from './words';

const width = 360;
const height = 130;
const box = { left: 30, right: width - 8, top: 10, bottom: height - 22 };
const most = 4;

/** VSWR over frequency, with the channel as a band and the level of 2 as a rule. */
export function vswrChart(a: Antenna) {
  const curve = a.curve ?? [];
  if (curve.length < 2) return html``;
  const lo = curve[0]!.frequency_hz;
  const hi = curve.at(-1)!.frequency_hz;
  const x = scale(lo, hi, box.left, box.right);
  const y = scale(1, most, box.bottom, box.top);
  const mhz = stepFor((hi - lo) / 1e6, 5) * 1e6;
  const channel = a.channel_hz ?? [a.frequency_hz, a.frequency_hz];
  const [from, to] = [x(channel[0]!), x(channel[1]!)];
  const path = curve.map((p) => `${x(p.frequency_hz).toFixed(1)} ${y(Math.min(p.vswr, most)).toFixed(1)}`).join('L');
  return html`<svg class="vswr" viewBox="0 0 ${width} ${height}" role="img"
    aria-label=${`${words.vswrCurve}: ${words.vswrRef(fixed(a.vswr.value, 2), fixed(a.vswr.reference_ohm, 0))}`}>
    <g class="axis">
      ${[1, 2, 3, 4].map(
        (v) => svg`<line class=${v === 2 ? 'rule' : ''} x1=${box.left} x2=${box.right} y1=${y(v)} y2=${y(v)} />
          <text x=${box.left - 6} y=${y(v) + 4} text-anchor="end">${v}</text>`,
      )}
      ${ticks(lo, hi, mhz).map((f) => svg`<text x=${x(f)} y=${height - 6} text-anchor="middle">${megahertz(f)}</text>`)}
      <text x=${box.right} y=${box.top + 8} text-anchor="end">MHz</text>
    </g>
    <rect class="channel" x=${Math.min(from, (from + to) / 2 - 1)} width=${Math.max(2, to - from)} y=${box.top} height=${box.bottom - box.top} />
    <text class="channel" x=${to + 5} y=${box.top + 9}>${words.channelMark}</text>
    <path d="M${path}" />
  </svg>`;
}
