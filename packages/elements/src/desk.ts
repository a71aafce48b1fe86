/** The classes of the elements for the hydrologist's desk, without defining them. */
export { RillageFitPanel, type FitDetail, type ProblemDetail, type SignOffDetail } from './rillage-fit-panel/rillage-fit-panel.js';
export type { FitChoices, FitRecord } from './rillage-fit-panel/proposal.js';
export { RillageForcingInput, type ForcingDetail, type LayoutDetail } from './rillage-forcing-input/rillage-forcing-input.js';
export type { ForcingFile } from './rillage-forcing-input/text-rows.js';
