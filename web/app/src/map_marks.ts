import type { Verdict } from './api';

const size = 30;

/** markImage draws a verdict's mark for the map, at twice its size, with a rim of paper. */
export function markImage(v: Verdict, colour: string, paper: string): ImageData {
  const canvas = new OffscreenCanvas(size, size);
  const ink = canvas.getContext('2d')!;
  const disc = (radius: number, from = 0, to = 2 * Math.PI) => {
    ink.beginPath();
    ink.arc(size / 2, size / 2, radius, from, to);
  };
  disc(14);
  ink.fillStyle = paper;
  ink.fill();
  ink.fillStyle = colour;
  ink.strokeStyle = colour;
  ink.lineWidth = 3;
  disc(9.5);
  ink.stroke();
  if (v === 'thin') disc(10.5, Math.PI / 2, (3 * Math.PI) / 2);
  if (v !== 'fails') ink.fill();
  return ink.getImageData(0, 0, size, size);
}
