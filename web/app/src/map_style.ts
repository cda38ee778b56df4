import type { LayerSpecification, StyleSpecification } from 'maplibre-gl';
import type { Ground } from './api';

/** Colours of the style sheet that the map needs as values. */
export type Colours = Record<
  | 'paper'
  | 'ink'
  | 'quiet'
  | 'sea'
  | 'tint-1'
  | 'tint-2'
  | 'tint-3'
  | 'tint-4'
  | 'tint-5'
  | 'contour'
  | 'closes'
  | 'thin'
  | 'fails'
  | 'accent'
  | 'shadow'
  | 'light',
  string
>;

export const colourNames = [
  'paper',
  'ink',
  'quiet',
  'sea',
  'tint-1',
  'tint-2',
  'tint-3',
  'tint-4',
  'tint-5',
  'contour',
  'closes',
  'thin',
  'fails',
  'accent',
  'shadow',
  'light',
] as const satisfies readonly (keyof Colours)[];

export interface StyleParts {
  colours: Colours;
  ground: Ground | undefined;
  origin: string;
  font: string;
  contours: boolean;
}

/** The map: the user's own ground in tints, shade and contours, the links over it, their figures on top. */
export function mapStyle(p: StyleParts): StyleSpecification {
  return {
    version: 8,
    // Without a glyph server the browser draws the labels from this one file; what it lacks comes from the system.
    'font-faces': { Plex: p.font },
    sources: {
      ...(p.ground ? groundSources(p.ground, p.origin, p.contours) : {}),
      links: { type: 'geojson', data: empty, promoteId: 'id' },
      figures: { type: 'geojson', data: empty },
      sites: { type: 'geojson', data: empty, promoteId: 'id' },
      measured: { type: 'geojson', data: empty },
      own: { type: 'geojson', data: empty },
    },
    layers: [
      {
        id: 'paper',
        type: 'background',
        paint: { 'background-color': p.ground?.beyond === 'sea' ? p.colours.sea : p.colours.paper },
      },
      ...(p.ground ? groundLayers(p.ground, p.colours, p.contours) : []),
      ...ownLayers(p.colours),
      ...linkLayers(p.colours),
    ],
  };
}

const empty = { type: 'FeatureCollection' as const, features: [] };

function groundSources(g: Ground, origin: string, contours: boolean): StyleSpecification['sources'] {
  const bounds: [number, number, number, number] = [g.west, g.south, g.east, g.north];
  const dem = {
    type: 'raster-dem' as const,
    encoding: 'terrarium' as const,
    tileSize: 256,
    minzoom: g.min_zoom,
    maxzoom: g.max_zoom,
    bounds,
  };
  return {
    ground: { ...dem, tiles: [origin + g.tiles] },
    filled: { ...dem, tiles: [origin + g.filled] },
    ...(contours
      ? { contours: { type: 'vector', tiles: [contourTiles(g)], maxzoom: 15, minzoom: g.min_zoom, bounds } }
      : {}),
  };
}

/** contourTiles asks for contours whose steps suit the zoom and the relief: minor and major heights by least zoom. */
export function contourTiles(g: Pick<Ground, 'min_m' | 'max_m'>): string {
  const relief = g.max_m - g.min_m;
  const factor = relief < 60 ? 0.1 : relief < 250 ? 0.4 : relief < 1500 ? 1 : 2;
  const steps = [
    [8, 100, 500],
    [11, 50, 250],
    [12, 20, 100],
    [14, 10, 50],
  ].map(([zoom, minor, major]) => `${zoom}*${minor! * factor}*${major! * factor}`);
  return (
    'dem-contour://{z}/{x}/{y}?contourLayer=contours&elevationKey=ele&levelKey=level&multiplier=1&overzoom=1' +
    `&thresholds=${steps.join('~')}`
  );
}

function groundLayers(g: Ground, c: Colours, contours: boolean): LayerSpecification[] {
  const relief = Math.max(20, g.max_m - Math.max(0, g.min_m));
  const from = Math.max(0, g.min_m);
  const tint = (part: number) => from + part * relief;
  const layers: LayerSpecification[] = [
    {
      id: 'tint',
      type: 'color-relief',
      source: 'ground',
      paint: {
        'color-relief-color': [
          'interpolate',
          ['linear'],
          ['elevation'],
          -1000,
          'rgba(0, 0, 0, 0)',
          -999,
          c.sea,
          from + 0.01,
          c.sea,
          from + 0.6,
          c['tint-1'],
          tint(0.15),
          c['tint-2'],
          tint(0.4),
          c['tint-3'],
          tint(0.7),
          c['tint-4'],
          tint(1),
          c['tint-5'],
        ],
      },
    },
    {
      id: 'shade',
      type: 'hillshade',
      source: 'ground',
      paint: {
        'hillshade-method': 'igor',
        'hillshade-exaggeration': 0.5,
        'hillshade-shadow-color': c.shadow,
        'hillshade-highlight-color': c.light,
      },
    },
  ];
  if (contours) {
    layers.push(
      {
        id: 'contours',
        type: 'line',
        source: 'contours',
        'source-layer': 'contours',
        filter: ['!=', ['get', 'ele'], 0],
        paint: {
          'line-color': c.contour,
          'line-width': ['match', ['get', 'level'], 1, 1.1, 0.6],
          'line-opacity': ['match', ['get', 'level'], 1, 0.85, 0.6],
        },
      },
      {
        id: 'contour-figures',
        type: 'symbol',
        source: 'contours',
        'source-layer': 'contours',
        filter: ['all', ['>', ['get', 'level'], 0], ['!=', ['get', 'ele'], 0]],
        layout: {
          'symbol-placement': 'line',
          'text-field': ['to-string', ['get', 'ele']],
          'text-font': ['Plex'],
          'text-size': 11,
          'text-padding': 40,
        },
        paint: { 'text-color': c.quiet, 'text-halo-color': c['tint-3'], 'text-halo-width': 1.2 },
      },
    );
  }
  return layers;
}

function ownLayers(c: Colours): LayerSpecification[] {
  return [
    {
      id: 'own-areas',
      type: 'fill',
      source: 'own',
      filter: ['==', ['geometry-type'], 'Polygon'],
      paint: { 'fill-color': c.accent, 'fill-opacity': 0.14 },
    },
    { id: 'own-lines', type: 'line', source: 'own', paint: { 'line-color': c.accent, 'line-width': 1.2 } },
    {
      id: 'own-points',
      type: 'circle',
      source: 'own',
      filter: ['==', ['geometry-type'], 'Point'],
      paint: {
        'circle-color': c.accent,
        'circle-radius': 3.5,
        'circle-stroke-color': c.paper,
        'circle-stroke-width': 1,
      },
    },
  ];
}

const chosen = ['boolean', ['feature-state', 'chosen'], false];

function linkLayers(c: Colours): LayerSpecification[] {
  const byVerdict = (closes: unknown, thin: unknown, fails: unknown) => [
    'match',
    ['get', 'verdict'],
    'closes',
    closes,
    'thin',
    thin,
    'fails',
    fails,
    c.quiet,
  ];
  return [
    {
      id: 'link-casing',
      type: 'line',
      source: 'links',
      paint: { 'line-color': c.paper, 'line-width': ['case', chosen, 9, 6] as never, 'line-opacity': 0.9 },
    },
    {
      id: 'links',
      type: 'line',
      source: 'links',
      layout: { 'line-cap': 'butt' },
      paint: {
        'line-color': byVerdict(c.closes, c.thin, c.fails) as never,
        'line-width': ['case', chosen, 5, 2.6] as never,
        'line-dasharray': [
          'match',
          ['get', 'verdict'],
          'thin',
          ['literal', [5, 2]],
          'fails',
          ['literal', [1, 1.4]],
          ['literal', [1, 0]],
        ] as never,
      },
    },
    {
      id: 'link-figures',
      type: 'symbol',
      source: 'figures',
      layout: {
        'symbol-sort-key': ['get', 'margin'],
        'icon-image': ['concat', 'mark-', ['get', 'verdict']],
        'icon-allow-overlap': true,
        'text-field': ['get', 'label'],
        'text-font': ['Plex'],
        'text-size': 13,
        'text-variable-anchor': ['left', 'right', 'bottom', 'top'],
        'text-radial-offset': 0.75,
        'text-optional': true,
        'text-padding': 1,
      },
      paint: { 'text-color': c.ink, 'text-halo-color': c.paper, 'text-halo-width': 2.5 },
    },
    {
      id: 'measured',
      type: 'line',
      source: 'measured',
      paint: { 'line-color': c.ink, 'line-width': 1.6, 'line-dasharray': [3, 2] },
    },
    {
      // Under the buttons of the sites, which printing leaves out.
      id: 'site-dots',
      type: 'circle',
      source: 'sites',
      paint: { 'circle-radius': 6, 'circle-color': c.paper, 'circle-stroke-color': c.ink, 'circle-stroke-width': 3 },
    },
    {
      id: 'site-names',
      type: 'symbol',
      source: 'sites',
      layout: {
        'text-field': ['get', 'id'],
        'text-font': ['Plex'],
        'text-size': 13,
        'text-variable-anchor': ['top', 'bottom', 'left', 'right'],
        'text-radial-offset': 0.95,
        'text-justify': 'auto',
        'text-padding': 1,
      },
      paint: { 'text-color': c.ink, 'text-halo-color': c.paper, 'text-halo-width': 2 },
    },
  ];
}
