import type { ReactiveController, ReactiveControllerHost } from 'lit';
import { catalogueFor, fill, hasCatalogue, loadCatalogue, type Message, type Messages } from './messages.js';

/** A host whose page may replace single messages. */
export interface Speaker extends ReactiveControllerHost, HTMLElement {
  messages?: Messages | undefined;
}

/**
 * The words of one element in the language of the nearest `lang`. A language without a catalogue is spoken in English, numbers and
 * dates included, so that no sentence mixes two.
 */
export class Language<Key extends string> implements ReactiveController {
  /** BCP 47 tag for `Intl` and for the `lang` of the element's own text. */
  tag = 'en';
  direction: 'ltr' | 'rtl' = 'ltr';

  constructor(
    private readonly host: Speaker,
    private readonly english: Record<Key, Messages[string]>,
  ) {
    host.addController(this);
  }

  hostConnected(): void {
    speakers.add(this);
    watchLang();
    this.read();
  }

  /** Also sees a `lang` within a shadow root, which no observer of the document does. */
  hostUpdate(): void {
    this.read();
  }

  hostDisconnected(): void {
    speakers.delete(this);
    if (!speakers.size) unwatchLang();
  }

  /** Looks for the nearest `lang` again; fetches the catalogue where it is not here yet. */
  read(): void {
    const wanted = validTag(nearestLang(this.host));
    const tag = hasCatalogue(wanted) || this.host.messages ? wanted : 'en';
    void loadCatalogue(wanted).then((came) => {
      if (!came || !this.host.isConnected) return;
      this.read();
      this.host.requestUpdate();
    });
    if (tag === this.tag) return;
    this.tag = tag;
    this.direction = rightToLeft.has(primary(tag)) ? 'rtl' : 'ltr';
    this.host.requestUpdate();
  }

  /** The message with its values put in: the host's own first, then the page's or the shipped catalogue, then English. */
  say(key: Key, values: Record<string, string | number> = {}): string {
    return this.sayFrom(this.english, key, values);
  }

  /** The same for a part that brings its own English. */
  sayFrom<Name extends string>(english: Record<Name, Message>, key: Name, values: Record<string, string | number> = {}): string {
    const message = own(this.host.messages, key) ?? own(catalogueFor(this.tag), key) ?? own(catalogueFor('en'), key) ?? english[key];
    return fill(message, values, this.tag);
  }

  /** Whether a text in `language` may stand in this element's text. */
  speaks(language: string): boolean {
    return primary(language) === primary(this.tag);
  }
}

/** The `lang` in force at a node, through shadow roots; empty where none is set. */
export function nearestLang(start: Node): string {
  for (let node: Node | null = start; node; node = node.parentNode ?? (node instanceof ShadowRoot ? node.host : null)) {
    const lang = node instanceof Element && node.getAttribute('lang');
    if (lang) return lang;
  }
  return '';
}

/** Called after a page adds or replaces messages. */
export function everySpeakerReads(): void {
  for (const speaker of speakers) {
    speaker.read();
    speaker['host'].requestUpdate();
  }
}

const rightToLeft = new Set(['ar', 'fa', 'he', 'ur', 'ps', 'yi', 'dv', 'ckb']);

const primary = (tag: string): string => tag.toLowerCase().split(/[-_]/)[0]!;

function validTag(lang: string): string {
  try {
    return Intl.getCanonicalLocales(lang.replaceAll('_', '-'))[0] ?? 'en';
  } catch {
    return 'en';
  }
}

function own(messages: Messages | undefined, key: string): Messages[string] | undefined {
  return messages && Object.hasOwn(messages, key) ? messages[key] : undefined;
}

const speakers = new Set<Language<string>>();
let observer: MutationObserver | undefined;

function watchLang(): void {
  if (observer) return;
  observer = new MutationObserver(() => speakers.forEach((speaker) => speaker.read()));
  observer.observe(document, { subtree: true, attributes: true, attributeFilter: ['lang'] });
}

function unwatchLang(): void {
  observer?.disconnect();
  observer = undefined;
}
