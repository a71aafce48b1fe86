import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { streams } from '../../demo-site/pages/stations.mjs';
import { fill } from '../../demo-site/tools/pages.mjs';

const page = (path: string): string => readFileSync(new URL(`../../demo-site/${path}`, import.meta.url), 'utf8');

describe('fill(template, values)', () => {
  it('escapes what goes into a hole, and leaves markup where it is asked for', () => {
    expect(fill('<p>{{name}}</p>{{{link}}}', { name: '<b> & "c"', link: '<a>' })).toBe('<p>&lt;b&gt; &amp; &quot;c&quot;</p><a>');
  });

  it('refuses a hole that nothing fills', () => {
    expect(() => fill('{{absent}}', {})).toThrow(/absent/);
  });
});

describe('the portal’s list', () => {
  const text = page('public/index.html');

  it('has every stream once, by name, with a link that works without a script', () => {
    const links = [...text.matchAll(/<h2><a href="\.\/stations\/([\w-]+)\.html">([^<]+)<\/a><\/h2>/g)].map(([, id, name]) => [id, name]);
    expect(links).toEqual(streams.map(({ id, name }) => [id, name]));
  });

  it('says of each what ground it is on, as its own page does', () => {
    for (const { ground } of streams) expect(text).toContain(ground);
  });

  it('says the caution and that all is invented in plain text, outside any element', () => {
    const plain = text.replace(/<rillage-station[\s\S]*?<\/rillage-station>/g, '').replace(/\s+/g, ' ');
    expect(plain).toMatch(/not a basis for drinking-water, bathing or emergency decisions/);
    expect(plain).toMatch(/are invented/);
  });
});

describe('the pages', () => {
  it.each(['public/index.html', 'public/column.html', 'pages/station.html', 'pages/embed.html'])(
    '%s has no inline script or style',
    (path) => {
      const text = page(path);
      expect(text).not.toMatch(/<style|\sstyle=|\son\w+=/i);
      for (const [tag] of text.matchAll(/<script[^>]*>/g)) expect(tag).toMatch(/ src="/);
    },
  );
});
