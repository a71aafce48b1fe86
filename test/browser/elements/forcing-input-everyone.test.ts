import { executeServerCommand, sendKeys, setViewport } from '@web/test-runner-commands';
import { expect } from 'chai';
import { guessLayout, readForcing, type Layout } from '@rillage/sdk';
import { recordFiles, recordLayout } from '../../../demo-site/service/thessle-brook.mjs';
import type { RillageForcingInput } from '../../../packages/elements/src/rillage-forcing-input/rillage-forcing-input.js';
import type { ForcingFile } from '../../../packages/elements/src/rillage-forcing-input/text-rows.js';
import '../../../packages/elements/src/rillage-forcing-input/define.js';
import { expectAccessible } from '../support/axe.js';
import { clear, mount, part, pause, settled, shown, stage, until } from './help.js';

const layout = recordLayout as unknown as Layout;
const calls = { guessLayout, readForcing };
const brook = (): Promise<ForcingFile[]> =>
  Promise.all(
    recordFiles.map(async (name: string) => ({
      name,
      text: await (await fetch(new URL(`../../../demo-site/data/thessle-brook/${name}`, import.meta.url))).text(),
    })),
  );

/** The invented record, read, with everything unfolded. */
async function page(read = true): Promise<RillageForcingInput> {
  document.documentElement.lang ||= 'en';
  document.title = 'Test page';
  const element = await mount('rillage-forcing-input', { ...calls, files: await brook(), layout: read ? layout : null });
  if (!read) return element;
  const buttons = [...element.shadowRoot!.querySelectorAll<HTMLButtonElement>('section > p > button')];
  buttons[0]!.click();
  await until(() => part(element, 'frame'), 'it is read');
  for (const folded of element.shadowRoot!.querySelectorAll('details')) folded.open = true;
  await settled(element);
  return element;
}

const emulate = (payload?: { media?: string; features?: { name: string; value: string }[] }): Promise<unknown> =>
  executeServerCommand('emulate', payload);
const resize = (width: number): Promise<void> => setViewport({ width, height: 800 }).catch(() => {});

describe('rillage-forcing-input, for everyone', () => {
  beforeEach(() => {
    document.head.append(Object.assign(document.createElement('meta'), { name: 'color-scheme', content: 'light dark', id: 'scheme' }));
  });
  afterEach(async () => {
    document.querySelector('#scheme')?.remove();
    document.documentElement.style.removeProperty('font-size');
    await emulate();
    await resize(800);
    clear();
  });

  for (const [name, value] of [
    ['prefers-color-scheme', 'light'],
    ['prefers-color-scheme', 'dark'],
    ['forced-colors', 'active'],
  ] as const) {
    it(`axe finds nothing with ${name}: ${value}, with questions open and when read`, async function () {
      this.timeout(60_000);
      await emulate({ features: [{ name, value }] });
      await page(false);
      await expectAccessible(stage());
      clear();
      const element = await page();
      [...element.shadowRoot!.querySelectorAll<HTMLButtonElement>('figure .buttons > button')].pop()!.click();
      await settled(element);
      await expectAccessible(stage());
    });
  }

  for (const [lang, words] of [
    ['de', ['Wie sie gelesen wird', 'Bitte ansehen', '3.658 Zeilen', 'höchste Temperatur']],
    ['ar', ['كيف يُقرأ', 'للنظر فيه', 'أعلى حرارة']],
  ] as const) {
    it(`speaks ${lang}, with axe finding nothing and nothing wider than the page at 320 px`, async function () {
      this.timeout(60_000);
      await resize(320);
      document.documentElement.lang = lang;
      document.documentElement.dir = lang === 'ar' ? 'rtl' : 'ltr';
      const element = await page();
      await until(() => words.every((word) => shown(element).includes(word)), `words in ${lang}`);
      expect(element.shadowRoot!.querySelector('div')!.dir).to.equal(document.documentElement.dir);
      // What the SDK says is English and says so.
      for (const said of element.shadowRoot!.querySelectorAll('dd')) expect([said.lang, said.dir]).to.deep.equal(['en', 'ltr']);
      expect(document.documentElement.scrollWidth).to.be.at.most(document.documentElement.clientWidth);
      await expectAccessible(stage());
    });
  }

  for (const size of ['100%', '200%']) {
    it(`is no wider than a page of 320 px with text at ${size}, and every control is 24 px high`, async function () {
      this.timeout(60_000);
      await resize(320);
      document.documentElement.style.fontSize = size;
      const element = await page();
      expect(document.documentElement.scrollWidth).to.be.at.most(document.documentElement.clientWidth);
      for (const one of element.shadowRoot!.querySelectorAll('button, input, select, textarea, summary')) {
        if (one.getClientRects().length === 0) continue;
        expect(one.getBoundingClientRect().height, one.outerHTML.slice(0, 80)).to.be.at.least(24);
      }
    });
  }

  it('is worked by keys alone: from an open question to its field, an answer, the reading, a line to change', async function () {
    this.timeout(60_000);
    const element = await page(false);
    const focused = (): Element | null => element.shadowRoot!.activeElement;
    const focus = (selector: string): void => element.shadowRoot!.querySelector<HTMLElement>(selector)!.focus();
    for (const answer of ['UTC', '23.4', '51.3']) {
      focus('[part="open"] button');
      await sendKeys({ press: 'Enter' });
      expect(focused()!.localName).to.equal('input');
      await sendKeys({ type: answer });
      await sendKeys({ press: 'Tab' });
      await settled(element);
    }
    expect(part(element, 'open')).to.equal(null);
    focus('section > p > button');
    await sendKeys({ press: 'Enter' });
    // Gaps stop the reading until a rule is named: the problems are shown, and a status says how many.
    await until(() => part(element, 'finding'), 'problems');
    await settled(element);
    expect(element.shadowRoot!.querySelector('.state')!.textContent).to.match(/Stops the reading \(\d+\)/);
    Object.assign(element, { layout });
    await settled(element);
    focus('section > p > button');
    await sendKeys({ press: 'Space' });
    await until(() => part(element, 'frame'), 'it is read');
    await settled(element);
    expect(focused()!.id).to.equal('found');
    focus('[part="finding"] button');
    await sendKeys({ press: 'Enter' });
    await settled(element);
    expect(focused()!.id).to.equal('editor');
    focus('.picture');
    await sendKeys({ press: 'End' });
    await until(() => element.shadowRoot!.querySelector('figure [role="status"]')!.textContent!.includes('March'), 'the cursor announces');
    expect(part(element, 'readout')!.textContent).to.match(/precipitation: .*discharge: .*lowest temperature: /);
    await sendKeys({ press: 'Escape' });
  });

  it('draws rain from the top, flow from the base, gaps as gaps, and says the same in the table', async function () {
    this.timeout(60_000);
    const days = ['2.4,0.5', '5,', ',0.75', '0,1', '10,0.25'].map((cells, index) => `2020-01-0${index + 1},${cells}`);
    const files = [
      { name: 'day.csv', text: `day,rain,flow\n${days.join('\n')}\n` },
      { name: 'stream.csv', text: 'day,d18O\n2020-01-02,-8\n2020-01-04,<-9\n' },
    ];
    const column = { position: 2, holds: 'precipitation', unit: 'mm' } as const;
    const small: Layout = {
      gaps: [
        { of: 'precipitation', fill: 'zero', upToSteps: 1 },
        { of: 'discharge', fill: 'linear', upToSteps: 1 },
      ],
      sources: [
        { time: { columns: [1], zone: 'UTC' }, columns: [column, { position: 3, holds: 'outflow', unit: 'mm/d' }] },
        { time: { columns: [1], zone: 'UTC' }, columns: [{ position: 2, holds: 'streamTracer', as: 'd18O', unit: 'permil' }] },
      ],
    };
    const element = await mount('rillage-forcing-input', { ...calls, files, layout: small });
    element.shadowRoot!.querySelector<HTMLButtonElement>('section > p > button')!.click();
    await until(() => part(element, 'frame'), 'it is read');
    await settled(element);
    const svg = element.shadowRoot!.querySelector('.picture > svg')!;
    const bars = [
      ...svg
        .querySelector('.rain')!
        .getAttribute('d')!
        .matchAll(/M[\d.]+ ([\d.]+)V([\d.]+)/g),
    ].map(([, top, end]) => [Number(top), Number(end)]);
    // Three wet days of five: each begins at the top and reaches down by its amount.
    expect(bars).to.have.length(3);
    expect(new Set(bars.map(([top]) => top)).size).to.equal(1);
    const depths = bars.map(([top, end]) => end! - top!);
    expect(depths[1]! / depths[2]!).to.be.closeTo(0.5, 0.01);
    expect(depths[0]! / depths[2]!).to.be.closeTo(0.24, 0.01);
    // Flow stops before its gap and goes on after it; each gap has a mark at its edge.
    expect([...svg.querySelectorAll('path.line')].map((path) => path.getAttribute('d')!.split('L').length)).to.include.members([1, 3]);
    expect(svg.querySelectorAll('.gap')).to.have.length(2);
    expect(svg.querySelectorAll('.bottle')).to.have.length(1);
    const rows = [...element.shadowRoot!.querySelectorAll('table tbody tr')].map((row) =>
      [...row.children].map((cell) => cell.textContent!.trim()),
    );
    expect(rows).to.deep.equal([
      ['January 1, 2020', '2.4', '0.5', '–', '–'],
      ['January 2, 2020', '5', '0.625, filled', '–', '-8'],
      ['January 3, 2020', '0, filled', '0.75', '–', '–'],
      ['January 4, 2020', '0', '1', '–', '< -9'],
      ['January 5, 2020', '10', '0.25', '–', '–'],
    ]);
  });

  it('shows hostile names, headers and cells as text, without marks that turn the writing', async function () {
    this.timeout(60_000);
    const evil = '<img src=x onerror="window.hurt=1">';
    const files = [
      {
        name: `\u202egpj.${evil}__proto__`,
        text: `day,rain_mm,__proto__,${evil}\n2020-01-01,1,2,3\n2020-01-02,"${evil.replaceAll('"', '""')}\u202e",constructor,4\n2020-01-03,1,2,3\n`,
      },
    ];
    const element = await mount('rillage-forcing-input', { ...calls, files });
    const first = (selector: string): HTMLButtonElement => element.shadowRoot!.querySelector<HTMLButtonElement>(selector)!;
    element.layout = { ...element.layout!, grid: { zone: 'UTC' } };
    await settled(element);
    first('section > p > button').click();
    await until(() => shown(element).includes('not-a-number'), 'the cell is refused');
    await settled(element);
    first('[part="finding"] .lines button').click();
    await settled(element);
    first('[name="value"]').value = `${evil}\u202e`;
    first('[part="editor"] button').click();
    await settled(element);
    await pause(50);
    expect(element.shadowRoot!.querySelector('img, script')).to.equal(null);
    expect((window as unknown as { hurt?: number }).hurt).to.equal(undefined);
    expect(shown(element)).to.contain(evil).and.to.contain('__proto__').and.not.to.contain('\u202e');
    expect(part(element, 'edit')!.textContent).to.contain(evil);
    expect(Object.prototype).not.to.have.property('rain_mm');
  });

  it('prints without fields and buttons, with the table whole', async function () {
    this.timeout(60_000);
    const element = await page();
    await emulate({ media: 'print' });
    await pause(50);
    if (!matchMedia('print').matches) return;
    for (const one of element.shadowRoot!.querySelectorAll('form, button')) expect(one.getClientRects()).to.have.length(0);
    expect(element.shadowRoot!.querySelector('figure .table')!.getClientRects()).to.have.length(1);
  });
});
