import type { Amount, DrivenAmount } from '../contract.js';
import { shorten, type Issue } from '../errors.js';

/** Where a parameter may lie. Bounds are inclusive unless `open`. */
export interface Domain {
  low: number;
  high: number;
  open: boolean;
  words: string;
}

export const POSITIVE: Domain = { low: 0, high: Infinity, open: true, words: 'a finite number above 0' };
/** Depths in mm that something is divided by. */
export const DEPTH: Domain = { low: 1e-6, high: 1e9, open: false, words: 'a finite depth in mm, 0.000001 or more' };
export const NOT_NEGATIVE: Domain = { low: 0, high: Infinity, open: false, words: 'a finite number of 0 or more' };
export const SHARE: Domain = { low: 0, high: 1, open: false, words: 'a number from 0 to 1' };

export function inDomain(value: number, domain: Domain): boolean {
  if (!Number.isFinite(value)) return false;
  return domain.open ? value > domain.low && value < domain.high : value >= domain.low && value <= domain.high;
}

/** A driven amount with its slot and its place, for the messages of a step where it leaves its domain. */
export interface DrivenSlot {
  slot: number;
  amount: DrivenAmount;
  domain: Domain;
  path: string;
}

/** Collects the parameters of a catchment's selections into numbered slots. Constants are checked here, driven ones at every step. */
export class AmountTable {
  readonly values: number[] = [];
  readonly driven: DrivenSlot[] = [];
  constructor(readonly issues: Issue[]) {}

  /** Slot of a number of our own. */
  constant(value: number): number {
    this.values.push(value);
    return this.values.length - 1;
  }

  add(amount: unknown, path: string, domain: Domain): number {
    const slot = this.constant(NaN);
    if (typeof amount === 'number') {
      if (!inDomain(amount, domain)) {
        this.issues.push({ code: 'parameter-domain', path, expected: domain.words, received: String(amount) });
      }
      this.values[slot] = amount;
    } else if (isDriven(amount)) {
      this.issues.push(...describeDriven(amount, path));
      this.driven.push({ slot, amount, domain, path });
    } else {
      this.issues.push({
        code: 'parameter-type',
        path,
        expected: `${domain.words}, or { driver, at, value }`,
        received: amount === undefined ? 'nothing' : shorten(amount),
        hint: 'Every parameter of a form must be given; there are no defaults.',
      });
    }
    return slot;
  }

  isConstant(slot: number): boolean {
    return slot < 0 || !this.driven.some((entry) => entry.slot === slot);
  }
}

export function isDriven(amount: unknown): amount is DrivenAmount {
  return typeof amount === 'object' && amount !== null && 'driver' in amount;
}

function describeDriven(amount: DrivenAmount, path: string): Issue[] {
  const issues: Issue[] = [];
  if (typeof amount.driver !== 'string' || amount.driver === '') {
    issues.push({ code: 'driver-name', path: `${path}.driver`, expected: 'the name of a driver', received: shorten(amount.driver) });
  }
  for (const key of ['at', 'value'] as const) {
    const list: unknown = amount[key];
    if (!Array.isArray(list) || list.length === 0 || !list.every((entry) => typeof entry === 'number' && Number.isFinite(entry))) {
      issues.push({ code: 'driver-table', path: `${path}.${key}`, expected: 'a list of finite numbers', received: shorten(list) });
    }
  }
  if (issues.length > 0) return issues;
  if (amount.at.length !== amount.value.length) {
    issues.push({
      code: 'driver-table',
      path,
      expected: 'as many values as places in at',
      received: `${amount.at.length} places and ${amount.value.length} values`,
    });
  }
  const turn = amount.at.findIndex((place, index) => index > 0 && place <= amount.at[index - 1]);
  if (turn > 0)
    issues.push({ code: 'driver-table', path: `${path}.at[${turn}]`, expected: 'places that increase', received: shorten(amount.at) });
  for (const key of Object.keys(amount)) {
    if (key !== 'driver' && key !== 'at' && key !== 'value') {
      issues.push({ code: 'unknown-field', path: `${path}.${key}`, expected: 'driver, at and value only', received: shorten(key) });
    }
  }
  return issues;
}

/** Value of a driven amount: linear between the places, held beyond them. */
export function drivenValue(amount: DrivenAmount, driver: number): number {
  const { at, value } = amount;
  const last = at.length - 1;
  if (driver <= at[0]) return value[0];
  if (driver >= at[last]) return value[last];
  let k = 0;
  while (driver > at[k + 1]) k++;
  return value[k] + ((driver - at[k]) / (at[k + 1] - at[k])) * (value[k + 1] - value[k]);
}

export type { Amount };
