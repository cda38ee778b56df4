import type { Map as Chart, GeoJSONSource } from 'maplibre-gl';
import type { Cover } from './cover';

const hatches = [11, 7, 4]; // pixels between the strokes, closer for better bands

/** drawCover puts a coverage map under the contours and links, or takes it away. */
export function drawCover(map: Chart, cover: Cover | undefined, origin: string, ink: string): void {
  const result = cover?.job.result;
  const kind = result ? cover.shown : 'none';
  const under = ['contours', 'link-casing'].find((id) => map.getLayer(id));
  for (const id of ['cover', 'bands-fill', 'bands-edge']) if (map.getLayer(id)) map.removeLayer(id);
  if (map.getSource('cover')) map.removeSource('cover');
  // The ground's tints would compete with the shades of the margin.
  if (map.getLayer('tint')) map.setPaintProperty('tint', 'color-relief-opacity', kind === 'margin' ? 0.25 : 1);
  if (!result) return;
  if (kind === 'margin') {
    map.addSource('cover', {
      type: 'raster',
      tiles: [origin + result.tiles],
      tileSize: 256,
      minzoom: result.min_zoom,
      maxzoom: result.max_zoom,
      bounds: [result.west, result.south, result.east, result.north],
    });
    const paint = { 'raster-opacity': 0.62, 'raster-resampling': 'nearest', 'raster-fade-duration': 0 } as const;
    map.addLayer({ id: 'cover', type: 'raster', source: 'cover', paint }, under);
  }
  if (kind === 'bands' && cover?.bands)
    drawBands(
      map,
      cover,
      result.bands.map((b) => b.from_db),
      ink,
      under,
    );
}

function drawBands(map: Chart, cover: Cover, fromDB: number[], ink: string, under: string | undefined): void {
  const data = cover.bands as Parameters<GeoJSONSource['setData']>[0];
  if (map.getSource('bands')) (map.getSource('bands') as GeoJSONSource).setData(data);
  else map.addSource('bands', { type: 'geojson', data, tolerance: 1.5 });
  fromDB.forEach((_, i) => {
    if (map.hasImage(`hatch-${i}`)) map.removeImage(`hatch-${i}`);
    map.addImage(`hatch-${i}`, hatch(hatches[Math.min(i, hatches.length - 1)]!, ink), { pixelRatio: 2 });
  });
  const pattern = ['match', ['get', 'from_db'], ...fromDB.flatMap((db, i) => [db, `hatch-${i}`]), 'hatch-0'];
  map.addLayer({ id: 'bands-fill', type: 'fill', source: 'bands', paint: { 'fill-pattern': pattern as never } }, under);
  map.addLayer(
    {
      id: 'bands-edge',
      type: 'line',
      source: 'bands',
      paint: { 'line-color': ink, 'line-width': 0.5, 'line-opacity': 0.7 },
    },
    under,
  );
}

/** hatch is a tile of oblique strokes that joins on to itself. */
function hatch(everyPx: number, ink: string): ImageData {
  const size = everyPx * 2;
  const pen = new OffscreenCanvas(size, size).getContext('2d')!;
  pen.strokeStyle = ink;
  pen.lineWidth = 2;
  for (const shift of [-size, 0, size]) {
    pen.beginPath();
    pen.moveTo(shift, size);
    pen.lineTo(shift + size, 0);
    pen.stroke();
  }
  return pen.getImageData(0, 0, size, size);
}
