import type { DistributionWithRange, StationHistory } from '@rillage/sdk';
import type { SectionData } from '../rillage-column-view/section-type.js';

/** What comes of a trial; whatever is absent leaves the element inside as it is. */
export interface ExploreResult {
  /** For `rillage-column-view`: what `makeSection` gives. */
  section?: SectionData;
  /** For `rillage-age-plot`. */
  distribution?: DistributionWithRange;
  /** For `rillage-age-history`: ages through time and the simulated tracer. */
  history?: StationHistory;
}

const takers = [
  ['-column-view', 'section'],
  ['-age-plot', 'distribution'],
  ['-age-history', 'history'],
] as const;

/** Gives each element inside the part that it draws, whatever prefix its tag has and whether or not it is upgraded yet. */
export function handOut(inside: Element, result: ExploreResult): void {
  for (const element of inside.querySelectorAll('*')) {
    for (const [ending, part] of takers) {
      if (element.localName.endsWith(ending) && result[part]) Object.assign(element, { [part]: result[part] });
    }
  }
}
