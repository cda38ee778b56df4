// Contour lines are cut from the terrain tiles inside the map's own worker.
import '../node_modules/maplibre-contour/dist/add-protocol-worker.js';
