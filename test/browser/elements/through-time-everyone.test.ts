import { executeServerCommand, setViewport } from '@web/test-runner-commands';
import { expect } from 'chai';
import '../../../packages/elements/src/rillage-age-history/define.js';
import '../../../packages/elements/src/rillage-age-plot/define.js';
import '../../../packages/elements/src/rillage-column-view/define.js';
import '../../../packages/elements/src/rillage-explorer/define.js';
import { expectAccessible } from '../support/axe.js';
import { clear, pause, settled, shown, stage, until } from './help.js';
import { catchment, trial } from './record.js';

const { section, history, distribution } = trial(10, catchment, 300);

/** The three on one page: a column view and a history of their own, and the explorer with both inside. */
async function page(): Promise<{ view: HTMLElement; past: HTMLElement; explorer: HTMLElement }> {
  document.documentElement.lang ||= 'en';
  document.title = 'Test page';
  const view = Object.assign(document.createElement('rillage-column-view'), { section, table: true });
  const past = Object.assign(document.createElement('rillage-age-history'), { history, table: true });
  const explorer = document.createElement('rillage-explorer');
  explorer.append(document.createElement('rillage-column-view'), document.createElement('rillage-age-history'));
  Object.assign(explorer, { catchment, compute: () => ({ section, history, distribution }) });
  stage().append(view, past, explorer);
  await settled(view, past, explorer);
  await pause(80);
  await settled(view, past, explorer);
  return { view, past, explorer };
}

const emulate = (payload?: { media?: string; features?: { name: string; value: string }[] }): Promise<unknown> =>
  executeServerCommand('emulate', payload);
const feature = (name: string, value: string): Promise<unknown> => emulate({ features: [{ name, value }] });
/** Where the driver cannot resize the window, the stage's own width is what the test holds things to. */
const resize = (width: number): Promise<void> => setViewport({ width, height: 800 }).catch(() => {});

describe('pictures through time, for everyone', () => {
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
    ['prefers-reduced-motion', 'reduce'],
  ] as const) {
    it(`axe finds nothing with ${name}: ${value}`, async function () {
      this.timeout(60_000);
      await feature(name, value);
      const { past } = await page();
      await expectAccessible(stage());
      Object.assign(past, { below: 'median' });
      await settled(past);
      await expectAccessible(past);
    });
  }

  for (const lang of ['de', 'ar']) {
    it(`speaks ${lang}, with axe finding nothing`, async function () {
      this.timeout(60_000);
      document.documentElement.lang = lang;
      document.documentElement.dir = lang === 'ar' ? 'rtl' : 'ltr';
      const { view, past, explorer } = await page();
      const words = lang === 'de' ? ['Untergrund', 'Abfluss', 'anders abginge'] : ['باطن الأرض', 'جريان', 'خرجت المياه'];
      await until(() => [view, past, explorer].every((element, index) => shown(element).includes(words[index]!)), lang);
      expect(view.shadowRoot!.querySelector('div')!.dir).to.equal(lang === 'ar' ? 'rtl' : 'ltr');
      // Time runs to the right in every language.
      const edge = view.shadowRoot!.querySelector('rect.edge')!.getBoundingClientRect();
      const before = view.shadowRoot!.querySelector('line.cut')!.getBoundingClientRect().left;
      expect(before).to.be.closeTo(edge.right, 6);
      await expectAccessible(stage());
    });
  }

  for (const [width, size] of [
    [320, '100%'],
    [320, '200%'],
    [1280, '200%'],
  ] as const) {
    for (const lang of ['en', 'de', 'ar']) {
      it(`nothing is cut or scrolls sideways at ${width} px with text at ${size}, in ${lang}`, async () => {
        await resize(width);
        const resized = innerWidth === width;
        if (!resized) (stage() as HTMLElement).style.inlineSize = `${width - 16}px`;
        document.documentElement.lang = lang;
        document.documentElement.dir = lang === 'ar' ? 'rtl' : 'ltr';
        document.documentElement.style.fontSize = size;
        const { view, past, explorer } = await page();
        await pause(120);
        const held = resized ? document.documentElement : stage();
        const culprits = [view, past, explorer].flatMap((element) =>
          [...element.shadowRoot!.querySelectorAll('*')]
            .filter((node) => !node.closest('.table') && node.getBoundingClientRect().right > innerWidth + 1)
            .map(
              (node) =>
                `${element.localName} ${node.localName}.${node.getAttribute('class') ?? ''} ${node.textContent?.trim().slice(0, 30)}`,
            ),
        );
        expect(held.scrollWidth, culprits.slice(0, 6).join('; ')).to.be.at.most(held.clientWidth);
        for (const element of [view, past, explorer]) {
          expect(element.scrollWidth, element.localName).to.be.at.most(Math.ceil(element.getBoundingClientRect().width) + 1);
        }
      });
    }
  }

  it('in forced colours, no area has a colour of ours: outlines, lines of years and words carry it', async () => {
    const { done } = (await feature('forced-colors', 'active')) as { done: boolean };
    const { view, past } = await page();
    const probe = document.createElement('span');
    probe.style.color = 'Canvas';
    stage().append(probe);
    const canvasColour = getComputedStyle(probe).color;
    if (!done) return;
    for (const area of [view.shadowRoot!.querySelector('rect.layer')!, past.shadowRoot!.querySelector('path.area')!])
      expect(getComputedStyle(area).fill).to.equal(canvasColour);
    expect(getComputedStyle(past.shadowRoot!.querySelector('path.between')!).stroke).not.to.equal('none');
    const bitmap = view.shadowRoot!.querySelector('canvas')!;
    const { data } = bitmap.getContext('2d')!.getImageData(0, 0, bitmap.width, bitmap.height);
    let coloured = 0;
    for (let at = 0; at < data.length; at += 4)
      if (data[at + 3]! > 250 && Math.max(data[at]!, data[at + 1]!, data[at + 2]!) - Math.min(data[at]!, data[at + 1]!, data[at + 2]!) > 8)
        coloured++;
    expect(coloured).to.equal(0);
  });

  it('draws the bands again, in other colours, when the page’s theme changes', async () => {
    const { view } = await page();
    const bitmap = view.shadowRoot!.querySelector('canvas')!;
    const sum = (): number => {
      const { data } = bitmap.getContext('2d')!.getImageData(0, 0, bitmap.width, bitmap.height);
      let total = 0;
      for (let at = 0; at < data.length; at += 40) total += data[at]!;
      return total;
    };
    const before = sum();
    document.documentElement.style.setProperty('--rillage-age-5', 'rgb(250, 10, 10)');
    try {
      await until(() => sum() !== before, 'another picture');
    } finally {
      document.documentElement.style.removeProperty('--rillage-age-5');
    }
  });

  it('prints picture and table, without buttons', async () => {
    const { view, past } = await page();
    Object.assign(view, { table: false });
    Object.assign(past, { table: false });
    dispatchEvent(new Event('beforeprint'));
    const { done } = (await emulate({ media: 'print' })) as { done: boolean };
    await settled(view, past);
    for (const element of [view, past]) {
      const root = element.shadowRoot!;
      if (done) {
        expect(getComputedStyle(root.querySelector('.table')!).display).to.equal('block');
        expect(getComputedStyle(root.querySelector('button')!).display).to.equal('none');
      }
      expect(root.querySelectorAll('tbody tr').length).to.be.greaterThan(25);
    }
    dispatchEvent(new Event('afterprint'));
  });

  it('moves nothing by itself', async () => {
    const { view, past, explorer } = await page();
    for (const element of [view, past, explorer]) {
      expect(element.getAnimations({ subtree: true }).length).to.equal(0);
      for (const node of element.shadowRoot!.querySelectorAll('*')) expect(getComputedStyle(node).transitionDuration).to.equal('0s');
    }
  });
});
