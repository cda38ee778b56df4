import { html, svg } from 'lit';
import type { Cut } from './cuts';
import { fixed } from './format';
import { words } from './words';

/** A Toward is a direction marked on a cut: of the chosen link, or of another one. */
export interface Toward {
  deg: number;
  name: string;
  chosen: boolean;
}

export interface PolarProps {
  cut: Cut;
  /** Degrees clockwise from the top to where the picture has them: compass bearings, or elevations from the right. */
  compass: boolean;
  towards: readonly Toward[];
  label: string;
  peakDBi: number;
}

const size = 200;
const centre = size / 2;
const radius = 76;
const depthDB = 30;

/** Gain along a circle, rings each 10 dB down from the antenna's peak. */
export function polarChart(p: PolarProps) {
  const place = (deg: number, r: number): [number, number] => {
    const a = ((p.compass ? deg - 90 : -deg) * Math.PI) / 180;
    return [centre + r * Math.cos(a), centre + r * Math.sin(a)];
  };
  const reach = (dbi: number) => radius * Math.max(0, 1 + (dbi - p.peakDBi) / depthDB);
  const text = (deg: number, r: number) => {
    const [x, y] = place(deg, r);
    return { x, y: y + 4 };
  };
  const around: [number, string][] = p.compass
    ? [
        [0, 'N'],
        [90, 'E'],
        [180, 'S'],
        [270, 'W'],
      ]
    : [
        [0, '0°'],
        [90, '90°'],
        [180, '0°'],
        [270, '−90°'],
      ];
  return html`<svg class="polar" viewBox="0 0 ${size} ${size}" role="img" aria-label=${p.label}>
    ${[0, 10, 20].map((down) => svg`<circle class="ring" cx=${centre} cy=${centre} r=${reach(p.peakDBi - down)} />`)}
    ${[0, 45, 90, 135].map((deg) => {
      const [x1, y1] = place(deg, radius);
      const [x2, y2] = place(deg + 180, radius);
      return svg`<line class="ring" x1=${x1} y1=${y1} x2=${x2} y2=${y2} />`;
    })}
    <path class="gain" d="M${p.cut.map((c) => point(place(c.deg, reach(c.dbi)))).join('L')}Z" />
    ${p.towards.map((t) => {
      const [x, y] = place(t.deg, radius + 2);
      return svg`<line class="toward ${t.chosen ? 'chosen' : ''}" x1=${centre} y1=${centre} x2=${x} y2=${y}>
        <title>${words.towards(t.name)}</title></line>`;
    })}
    ${[0, 10, 20].map((down) => {
      const at = text(p.compass ? 22 : 67, reach(p.peakDBi - down));
      return svg`<text class="level" x=${at.x} y=${at.y} text-anchor="middle">${fixed(p.peakDBi - down, down === 0 ? 1 : 0)}</text>`;
    })}
    ${around.map(([deg, name]) => {
      const at = text(deg, radius + 12);
      return svg`<text x=${at.x} y=${at.y} text-anchor="middle">${name}</text>`;
    })}
  </svg>`;
}

const point = ([x, y]: [number, number]): string => `${x.toFixed(1)} ${y.toFixed(1)}`;
