/** A number with what makes it checkable: its unit (UCUM spelling), its standard uncertainty in that unit, and where it is from. */
export interface Quantity {
  value: number;
  unit: string;
  /** Standard uncertainty; absent where the value is exact by definition. */
  uncertainty?: number;
  source: string;
}
