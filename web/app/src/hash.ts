/** What the address keeps of a view, so that it can be shared. */
export interface View {
  at?: { lat: number; lon: number; zoom: number };
  link?: string;
  cover?: string;
}

/** readHash reads a fragment as writeHash wrote it; a part that cannot be read is left out. */
export function readHash(hash: string): View {
  const parts = new URLSearchParams(hash.replace(/^#/, ''));
  const view: View = {};
  const [lat, lon, zoom, ...more] = (parts.get('at') ?? '').split(',').map((p) => (p.trim() === '' ? Number.NaN : +p));
  if (more.length === 0 && within(lat, -90, 90) && within(lon, -180, 180) && within(zoom, 0, 24)) {
    view.at = { lat, lon, zoom };
  }
  const link = parts.get('link');
  if (link) view.link = link;
  const cover = parts.get('cover');
  if (cover) view.cover = cover;
  return view;
}

function within(x: number | undefined, least: number, most: number): x is number {
  return x !== undefined && x >= least && x <= most;
}

export function writeHash(view: View): string {
  const parts = [];
  if (view.at) parts.push(`at=${view.at.lat.toFixed(5)},${view.at.lon.toFixed(5)},${view.at.zoom.toFixed(2)}`);
  if (view.link) parts.push(`link=${encodeURIComponent(view.link)}`);
  if (view.cover) parts.push(`cover=${encodeURIComponent(view.cover)}`);
  return parts.length > 0 ? `#${parts.join('&')}` : '';
}
