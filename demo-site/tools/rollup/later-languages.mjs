/**
 * Leaves the words of other languages out of a single-file build: each is a file beside it, fetched when a page's `lang` first asks for it. A
 * page in English, or one that does not copy them, shows English.
 */
export function laterLanguages() {
  return {
    name: 'later-languages',
    resolveId(source) {
      const [, language] = /languages\/([a-z]+)\.js$/.exec(source) ?? [];
      return language ? { id: `./${languageFile(language)}`, external: true } : null;
    },
  };
}

/** The file of one language, beside the single-file builds of elements. */
export const languageFile = (language) => `rillage-words-${language}.min.js`;
