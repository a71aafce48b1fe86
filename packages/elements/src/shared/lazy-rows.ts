/**
 * Rows of a table that are made when they are read: a table of hundreds shows 25, and most tables are never opened.
 * @returns  what behaves as an array of `count` rows wherever it is only read
 */
export function lazyRows(count: number, make: (index: number) => string[]): string[][] {
  const made: string[][] = new Array<string[]>(count);
  const index = (key: string | symbol): number => (typeof key === 'string' && /^\d+$/.test(key) ? Number(key) : -1);
  return new Proxy(made, {
    has: (target, key) => Reflect.has(target, key) || (index(key) >= 0 && index(key) < count),
    get(target, key): unknown {
      const at = index(key);
      if (at >= 0 && at < count) return (target[at] ??= make(at));
      return Reflect.get(target, key);
    },
  });
}
