/** The classes of the elements for readers, without defining them. */
export { RillageAgePlot, type AgePlotView } from './rillage-age-plot/rillage-age-plot.js';
export { RillageReading } from './rillage-reading/rillage-reading.js';
export { RillageStation } from './rillage-station/rillage-station.js';
export { RillageAgeHistory } from './rillage-age-history/rillage-age-history.js';
export { RillageColumnView } from './rillage-column-view/rillage-column-view.js';
export { RillageExplorer, type ExploreDetail, type ExploreRequest } from './rillage-explorer/rillage-explorer.js';
export type { ExploreResult } from './rillage-explorer/hand-out.js';
export type { SectionData, SectionDataColumn } from './rillage-column-view/section-type.js';
