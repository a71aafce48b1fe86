export { RillageAgePlot, type AgePlotView } from './rillage-age-plot/rillage-age-plot.js';
export { RillageReading } from './rillage-reading/rillage-reading.js';
export { RillageStation } from './rillage-station/rillage-station.js';
