import { describe, expect, it } from 'vitest';
import { readFileSync } from 'node:fs';
import { messages as ar } from '../../../packages/elements/src/languages/ar.js';
import { messages as de } from '../../../packages/elements/src/languages/de.js';
import { ageHistoryMessages } from '../../../packages/elements/src/rillage-age-history/messages.js';
import { agePlotMessages } from '../../../packages/elements/src/rillage-age-plot/messages.js';
import { columnViewMessages } from '../../../packages/elements/src/rillage-column-view/messages.js';
import { explorerMessages } from '../../../packages/elements/src/rillage-explorer/messages.js';
import { composeMessages } from '../../../packages/elements/src/rillage-reading/compose-messages.js';
import { detailsMessages } from '../../../packages/elements/src/rillage-reading/details-messages.js';
import { fitPanelMessages } from '../../../packages/elements/src/rillage-fit-panel/messages.js';
import { forcingInputMessages } from '../../../packages/elements/src/rillage-forcing-input/messages.js';
import { readingMessages } from '../../../packages/elements/src/rillage-reading/messages.js';
import { stationMessages } from '../../../packages/elements/src/rillage-station/messages.js';
import { fill, type Message, type Messages } from '../../../packages/elements/src/shared/messages.js';
import { version } from '../../../packages/elements/src/version.js';

const english: Messages = {
  ...ageHistoryMessages,
  ...columnViewMessages,
  ...explorerMessages,
  ...fitPanelMessages,
  ...forcingInputMessages,
  ...agePlotMessages,
  ...composeMessages,
  ...detailsMessages,
  ...readingMessages,
  ...stationMessages,
};
const texts = (message: Message): string[] => (typeof message === 'string' ? [message] : Object.values(message));
const places = (message: Message): string[] =>
  [...new Set(texts(message).flatMap((text) => [...text.matchAll(/\{(\w+)\}/g)].map(([, name]) => name!)))].sort();

describe('languages', () => {
  for (const [tag, messages] of [
    ['de', de],
    ['ar', ar],
  ] as const) {
    it(`${tag} says every message of English, and none besides`, () => {
      expect(Object.keys(messages).sort()).toEqual(Object.keys(english).sort());
    });

    it(`${tag} puts in every value that English does`, () => {
      for (const [key, message] of Object.entries(english)) {
        // A plural form may leave out a count that its words already say.
        const missing = places(message).filter((name) => name !== 'count' && !places(messages[key]!).includes(name));
        expect(missing, key).toEqual([]);
        expect(
          places(messages[key]!).filter((name) => !places(message).includes(name)),
          key,
        ).toEqual([]);
      }
    });

    it(`${tag} has a form for every plural category where it has several`, () => {
      const categories = new Intl.PluralRules(tag).resolvedOptions().pluralCategories;
      for (const [key, message] of Object.entries(messages)) {
        if (typeof message === 'string' || !('few' in message || tag === 'de')) continue;
        for (const category of categories) expect(message[category] ?? message.other, `${key} ${category}`).toBeTruthy();
      }
    });
  }
});

describe('fill()', () => {
  it('fill() chooses the plural by count, in the language', () => {
    expect(fill({ one: '{count} litre', other: '{count} litres' }, { count: 1 }, 'en')).toBe('1 litre');
    expect(fill(ar['reading.lead']!, { count: 23, of: '100', water: 'w', date: 'd', period: 'p', range: 'r' }, 'ar')).toContain('لترًا');
  });

  it('fill() never reads a value as a message, and leaves what it does not know', () => {
    expect(fill('{a} {b} {toString}', { a: '{b}', b: 'x' }, 'en')).toBe('{b} x {toString}');
  });
});

describe('version', () => {
  it('is the version in package.json', () => {
    const { version: packed } = JSON.parse(readFileSync(new URL('../../../packages/elements/package.json', import.meta.url), 'utf8')) as {
      version: string;
    };
    expect(version).toBe(packed);
  });
});
