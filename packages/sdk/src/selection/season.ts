const MS_PER_DAY = 86_400_000;

/** Fraction of the calendar year (UTC) that has passed at an instant: 0 at the start of 1 January. */
export function seasonFraction(milliseconds: number): number {
  const year = new Date(milliseconds).getUTCFullYear();
  const start = Date.UTC(year, 0, 1);
  return (milliseconds - start) / (Date.UTC(year + 1, 0, 1) - start);
}

/** Milliseconds since 1970 of the middle of a step. */
export function middleOfStep(startMilliseconds: number, stepDays: number, step: number): number {
  return startMilliseconds + (step + 0.5) * stepDays * MS_PER_DAY;
}
