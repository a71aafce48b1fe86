/** An element class that knows which version of the package it came from. */
export interface VersionedElement extends CustomElementConstructor {
  readonly version?: string;
}

/** Every element that this copy was asked to define under its own tag, by the tag's ending. */
export const defined = new Map<string, VersionedElement>();

/**
 * Defines a tag unless it is taken: the first definition wins, a different second one is reported with both versions and dropped.
 * @returns true where this call made the definition
 */
export function define(tag: string, element: VersionedElement): boolean {
  if (tag.startsWith('rillage-')) defined.set(tag.slice('rillage-'.length), element);
  const registry = globalThis.customElements;
  if (!registry) return false;
  const present = registry.get(tag) as VersionedElement | undefined;
  if (!present) {
    registry.define(tag, element);
    return true;
  }
  if (present !== element) {
    console.warn(
      `<${tag}> is already defined by version ${present.version ?? 'unknown'}; the definition of version ${element.version ?? 'unknown'} was left out.`,
    );
  }
  return false;
}

/**
 * Defines every given element as `prefix-suffix`. A class can carry one tag only, so each gets a subclass of its own.
 * @returns the tags that this call defined
 */
export function defineWithPrefix(prefix: string, elements: Record<string, VersionedElement>): string[] {
  const defined: string[] = [];
  for (const [suffix, element] of Object.entries(elements)) {
    const tag = `${prefix}-${suffix}`;
    if (define(tag, class extends element {})) defined.push(tag);
  }
  return defined;
}
