/**
 * How a set of files is to be read: plain data, JSON-safe, the caller's word on every question the files leave open.
 * `guessLayout` proposes one, the caller confirms it, `readForcing` obeys it. Types only; defaults are written out by `settleLayout`.
 */
export interface SettledLayout {
  kind: 'rillage-layout';
  version: 1;
  /** In the order of the sources handed over. */
  sources: SettledSource[];
  grid: GridLayout;
  /** Catchment area; null is fine while no column is a volume or a flow. */
  areaKm2: number | null;
  /** Degrees north; for evapotranspiration. */
  latitude: number | null;
  /** Metres above sea level; for Penman–Monteith. */
  altitude: number | null;
  /** By series (`precipitation`, `tmin`, an outflow's or driver's name). What is not named here stops at its first gap. */
  gaps: GapRule[];
  rainConcentration: RainConcentrationRule;
  /** null: precipitation reaches storage on the day it falls. */
  snow: SnowRule | null;
  /** null: evapotranspiration is a column, or there is none. */
  evapotranspiration: EvapotranspirationRule | null;
  limits: IntakeLimits;
}

/** The steps of the forcing. */
export interface GridLayout {
  /** Whole minutes; a divisor or a multiple of a day. */
  stepDays: number;
  /** `hh:mm` at which a step begins on the local clock of `zone` (its standard time where it has daylight saving). */
  dayBegins: string;
  /** `UTC`, a fixed offset such as `+01:00`, or an IANA name. null: that of the first source that has one; unsettled where none has. */
  zone: string | null;
  /** ISO instants or dates that bound the record; null: as far as every series reaches. `to` is where it ends, not the last step. */
  from: string | null;
  to: string | null;
}

export interface SettledSource {
  /** How findings call it; '' takes the name of the source handed over. */
  name: string;
  splitAt: ',' | ';' | '\t' | '|' | 'blanks';
  decimalMark: '.' | ',';
  /** Thousands mark inside numbers; '' for none. */
  groupMark: '' | ',' | '.' | ' ' | "'";
  /** Lines that begin so are remarks; '' for none. */
  remarkMark: string;
  /** Rows counted from 1 after remarks and blank lines are left out; 0 where there is no such row. */
  namesRow: number;
  unitsRow: number;
  typesRow: number;
  dataFrom: number;
  /** `months`: each row is a month and the days stand beside one another. */
  table: 'rows' | 'months';
  time: TimeLayout;
  /** Nominal spacing; null for samples and other irregular series. */
  everyDays: number | null;
  /** A row with cells beyond the last column that are not empty. */
  longRows: 'refuse' | 'skip';
  /** Two rows of one time that differ. */
  repeatedTime: 'refuse' | 'first' | 'last';
  columns: SettledColumn[];
  /** Cells that stand otherwise than the file has them; applied before anything else reads the cell, each of them a finding. */
  edits: CellEdit[];
}

/** One cell that someone has changed, with who or what says so in `why`. The file stays as it is. */
export interface CellEdit {
  /** Line in the text at which the row begins, from 1, as findings count. */
  row: number;
  /** Column, from 1. */
  position: number;
  /** Text that stands in place of the cell. */
  value: string;
  why: string;
}

export interface TimeLayout {
  /** Positions from 1. Several are joined by a blank: date and clock, or year, month, day. With `from`, this is the end of the interval. */
  columns: number[];
  /** Positions of the interval's beginning; empty where an interval follows from the neighbouring row. */
  from: number[];
  /** `iso`, `serial1900`, `serial1904`, or a pattern of YYYY YY MM DD MON hh mm ss AP Z. null: unsettled. */
  writtenAs: string | null;
  /** Of stamps that carry no offset. null: that of the grid. */
  zone: string | null;
  /** `hh:mm` that a stamp without a clock stands for. */
  readAt: string;
  /** The stamp names the last day that belongs to the interval, so the interval ends a day later. */
  lastDayIncluded: boolean;
  /** The hour that comes twice when daylight saving ends. */
  repeatedHour: 'inOrder' | 'first' | 'second' | 'refuse';
  /** The hour that does not exist when daylight saving begins. */
  missingHour: 'refuse' | 'shift';
}

export type Holds =
  'precipitation' | 'inflow' | 'outflow' | 'tmin' | 'tmax' | 'tmean' | WeatherName | 'rainTracer' | 'streamTracer' | 'driver' | 'ignored';
export type WeatherName = 'dewPoint' | 'humidityMax' | 'humidityMin' | 'humidityMean' | 'windSpeed' | 'sunshine' | 'solarRadiation';

/** What a value stands for: see the README of this room. */
export type StandsFor = 'instant' | 'meanPreceding' | 'meanFollowing' | 'totalPreceding' | 'totalFollowing' | 'runningTotal' | 'bulk';

export interface SettledColumn {
  /** From 1. */
  position: number;
  /** Header as found; checked against the file where it has a names row. '' is not checked. */
  name: string;
  holds: Holds;
  /** Name of the outflow, tracer or driver; '' for the rest. */
  as: string;
  /** UCUM or everyday spelling; null: unsettled (drivers may leave it so). */
  unit: string | null;
  standsFor: StandsFor;
  /** Cells that mean "no value", besides the empty one. */
  absent: string[];
  /** Cells that mean "too little to measure": zero, flagged. */
  trace: string[];
  /** Mark after a number that says it is the total since the last value. */
  accumulatedMark: string;
  /** `afterGap`: a value after missing ones is the total over them. */
  accumulates: 'no' | 'marked' | 'afterGap';
  /** What `<0.05` becomes in a series. Samples keep it as censored. */
  belowDetection: 'refuse' | 'limit' | 'half' | 'zero';
  /** A flux below zero. */
  negative: 'refuse' | 'zero';
  /** In a table of months: days standing beside one another from this position on. */
  daysAcross: number;
  /** Stated standard error of a laboratory value, same unit; null: not stated. */
  standardError: number | null;
  /** Of a stream sample: the outflow it was taken from. */
  of: string;
}

export type FillRule = 'stop' | 'zero' | 'previous' | 'linear' | 'recession' | 'seasonalMean';
export interface GapRule {
  of: string;
  fill: FillRule;
  /** Longest gap it may fill; a longer one stops the run. */
  upToSteps: number;
}

export interface RainConcentrationRule {
  rule: 'bulkConstant' | 'seasonalPlusResidual' | 'randomRedistribution';
  /** Steps with inflow that no sample covers. */
  uncovered: 'stop' | 'amountWeightedMean' | 'seasonalCurve';
  /** For `randomRedistribution`. */
  seed: number;
}

export interface SnowRule {
  /** mm per degree and day. */
  meltFactor: number;
  /** Cel */
  meltAbove: number;
  /** Cel: at or below, precipitation is snow. */
  snowBelow: number;
  /** Cel: at or above, precipitation is rain; linear between. Equal to `snowBelow` for a sharp threshold. */
  rainAbove: number;
}

export interface EvapotranspirationRule {
  method: 'hargreaves' | 'penmanMonteith';
  /** Outflow's name. */
  as: string;
  /** Multiplies the reference value: 1 leaves it. */
  factor: number;
  /** Limited by water in the root zone; null: not limited. */
  limit: { capacity: number; stressBegins: number; initialDepletion: number } | null;
}

export interface IntakeLimits {
  bytes: number;
  rows: number;
  columns: number;
  steps: number;
}

type Optional<T, Needed extends keyof T> = Pick<T, Needed> & Partial<Omit<T, Needed>>;

/** What a caller writes: everything but the essentials may be left out, and takes the default of `settleLayout`. */
export type Layout = Partial<Omit<SettledLayout, 'sources' | 'grid' | 'rainConcentration' | 'snow' | 'evapotranspiration' | 'limits'>> & {
  sources: SourceLayout[];
  grid?: Partial<GridLayout>;
  rainConcentration?: Partial<RainConcentrationRule>;
  snow?: Optional<SnowRule, 'meltFactor'> | null;
  evapotranspiration?: Optional<EvapotranspirationRule, 'method'> | null;
  limits?: Partial<IntakeLimits>;
};
export type SourceLayout = Partial<Omit<SettledSource, 'time' | 'columns' | 'edits'>> & {
  time: Optional<TimeLayout, 'columns'>;
  columns: ColumnLayout[];
  edits?: CellEditLayout[];
};
export type CellEditLayout = Optional<CellEdit, 'row' | 'position' | 'value'>;
export type ColumnLayout = Optional<SettledColumn, 'position' | 'holds'>;
