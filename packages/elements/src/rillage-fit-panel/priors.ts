import type { Prior } from '@rillage/sdk';

/** A prior in plain data, with the way to it. */
export interface Placed {
  path: string;
  keys: (string | number)[];
  prior: Prior;
}

/** Every prior in a piece of plain data, in the order of its keys; paths are written as the SDK writes them. */
export function priorsIn(data: unknown, path: string, keys: (string | number)[] = []): Placed[] {
  if (typeof data !== 'object' || data === null) return [];
  if (Object.hasOwn(data, 'prior')) return [{ path, keys, prior: data as Prior }];
  const within = (value: unknown, key: string | number): Placed[] =>
    priorsIn(value, typeof key === 'number' ? `${path}[${key}]` : `${path}.${key}`, [...keys, key]);
  if (Array.isArray(data)) return data.flatMap((value, index) => within(value, index));
  return Object.entries(data).flatMap(([key, value]) => within(value, key));
}

/** The data with something else at the end of a way; what is given is not changed. */
export function withAt<T>(data: T, keys: readonly (string | number)[], value: unknown): T {
  const [key, ...rest] = keys;
  if (key === undefined) return value as T;
  const copy = (Array.isArray(data) ? [...(data as unknown[])] : { ...data }) as Record<string | number, unknown>;
  copy[key] = withAt(copy[key], rest, value);
  return copy as T;
}

/** Fields of each kind of prior, in the order in which they are asked for. */
export const fieldsOf: Record<Prior['prior'], readonly string[]> = {
  uniform: ['low', 'high'],
  logUniform: ['low', 'high'],
  normal: ['mean', 'sd'],
  logNormal: ['median', 'logSd'],
  truncatedNormal: ['mean', 'sd', 'low', 'high'],
  beta: ['a', 'b'],
};

/** The prior as another kind about the same place: as near as its two numbers allow. */
export function asKind(prior: Prior, kind: Prior['prior']): Prior {
  const has = prior as unknown as Record<string, number | undefined>;
  const spread = has['sd'] ?? 1;
  const middle = has['mean'] ?? has['median'] ?? ((has['low'] ?? 0) + (has['high'] ?? 1)) / 2;
  const low = has['low'] ?? middle - 2 * spread;
  const high = has['high'] ?? middle + 2 * spread;
  const sd = has['sd'] ?? (high - low) / 4;
  const all: Record<string, number> = {
    low: kind === 'logUniform' ? Math.max(low, 1e-6 * Math.abs(high) || 1e-6) : low,
    high,
    mean: middle,
    sd,
    median: Math.abs(middle) || 1,
    logSd: 0.7,
    a: 2,
    b: 2,
  };
  return { prior: kind, ...Object.fromEntries(fieldsOf[kind].map((field) => [field, all[field]])) } as unknown as Prior;
}

/** `catchment.selection.discharge.scale.value[0]` as `discharge · scale · 1`: the words of the data, without the scaffolding. */
export function pathWords(path: string): string {
  return path
    .replace(/\[(\d+)\]/g, (_whole, index: string) => `.${Number(index) + 1}`)
    .split('.')
    .filter((part) => !['catchment', 'selection', 'tracers', 'value'].includes(part))
    .join(' · ');
}
