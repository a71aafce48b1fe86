import type { AxeResults, RunOptions } from 'axe-core';

interface Axe {
  run(context: Element, options: RunOptions): Promise<AxeResults>;
}

/**
 * Fails where axe finds anything wrong with an element and what is inside, shadow trees included: WCAG 2.2 A and AA and good practice.
 * Not for tests under csp/: axe itself needs no markup from strings, but its script is loaded here, from the same origin.
 */
export async function expectAccessible(element: Element, options: RunOptions = {}): Promise<void> {
  const axe = await loaded();
  const { violations } = await axe.run(element, {
    resultTypes: ['violations'],
    ...options,
    rules: { region: { enabled: false }, ...options.rules },
  });
  if (violations.length === 0) return;
  const lines = violations.flatMap(({ id, help, nodes }) => [
    `${id}: ${help}`,
    ...nodes.map((node) => `  ${node.target.join(' ')}  ${node.failureSummary ?? ''}`),
  ]);
  throw new Error(lines.join('\n'));
}

let loading: Promise<Axe> | undefined;

/** axe is no module; it leaves a global. */
function loaded(): Promise<Axe> {
  loading ??= new Promise((settle, fail) => {
    const script = document.createElement('script');
    script.src = '/node_modules/axe-core/axe.min.js';
    script.onload = () => settle((globalThis as unknown as { axe: Axe }).axe);
    script.onerror = () => fail(new Error('axe-core could not be loaded'));
    document.head.append(script);
  });
  return loading;
}
