/** The section as `makeSection` of the SDK gives it: the part of it that is drawn. */
export interface SectionData {
  kind: 'rillage-section';
  version: 1;
  /** ISO instant at which the first step begins. */
  start: string;
  stepDays: number;
  steps: number;
  columns: SectionDataColumn[];
  flow: { stepDays: number; outflows: Record<string, number[]> };
  storageInformed: boolean;
  units: Record<string, string>;
}

/** One kept moment; lists run from the youngest layer downwards. */
export interface SectionDataColumn {
  step: number;
  storage: number;
  preRecordDepth: number;
  bottom: number[];
  youngest: number[];
  oldest: number[];
  concentration: Record<string, number[]>;
  selection: Record<string, number[]>;
  flow: Record<string, number>;
}
