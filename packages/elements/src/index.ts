/** Defines every element under its own tag, and exports the classes and what a page may set. */
import './rillage-age-history/define.js';
import './rillage-age-plot/define.js';
import './rillage-column-view/define.js';
import './rillage-explorer/define.js';
import './rillage-fit-panel/define.js';
import './rillage-forcing-input/define.js';
import './rillage-reading/define.js';
import './rillage-station/define.js';

export * from './classes.js';
export * from './desk.js';
export { addMessages, defineAll } from './page.js';
export type { Message, Messages } from './shared/messages.js';
export type { SharedCursor } from './shared/cursor-link.js';
export type { StationState, StationView, StationWanted } from './shared/station-link.js';
export { version } from './version.js';
