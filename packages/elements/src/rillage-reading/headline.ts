import type { Reading } from '@rillage/sdk';

/** The share the sentence is about: at `days` where the record can place it, else at the longest age it can place, else the first. */
export function headline(reading: Reading, days: number): Reading['younger'][number] | null {
  const stated = reading.younger.filter(({ share }) => share !== null);
  const placed = stated.filter(({ unplaced }) => unplaced <= negligible);
  return placed.find((one) => one.days === days) ?? placed.at(-1) ?? stated[0] ?? null;
}

// Below half a per cent an unplaced share changes no rounded number.
export const negligible = 0.005;
