import {
  RillageAgeHistory,
  RillageAgePlot,
  RillageColumnView,
  RillageExplorer,
  RillageFitPanel,
  RillageForcingInput,
  RillageReading,
  RillageStation,
} from './classes.js';
import { define, defineWithPrefix } from './shared/define.js';
import { everySpeakerReads } from './shared/language.js';
import { putMessages, type Messages } from './shared/messages.js';

/**
 * Defines all elements, under a prefix of the page's own where `rillage-` is taken, such as by another copy: `defineAll({ prefix: 'agency' })`
 * gives `agency-station` and so on. A tag that is taken is left as it is, with a warning.
 * @returns the tags that this call defined
 */
export function defineAll({ prefix = 'rillage' }: { prefix?: string } = {}): string[] {
  if (prefix !== 'rillage') return defineWithPrefix(prefix, elements);
  return Object.entries(elements)
    .map(([suffix, element]) => [`rillage-${suffix}`, element] as const)
    .filter(([tag, element]) => define(tag, element))
    .map(([tag]) => tag);
}

/** Replaces single messages of a language, or brings a whole one; everything on the page follows. */
export function addMessages(language: string, messages: Messages): void {
  putMessages(language, messages);
  everySpeakerReads();
}

const elements = {
  'age-history': RillageAgeHistory,
  'age-plot': RillageAgePlot,
  'column-view': RillageColumnView,
  explorer: RillageExplorer,
  'fit-panel': RillageFitPanel,
  'forcing-input': RillageForcingInput,
  reading: RillageReading,
  station: RillageStation,
};
