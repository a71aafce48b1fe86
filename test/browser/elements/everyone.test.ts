import { executeServerCommand, setViewport } from '@web/test-runner-commands';
import 'axe-core/axe.min.js';
import { expect } from 'chai';
import type { RillageAgePlot, RillageReading, RillageStation } from '../../../packages/elements/src/index.js';
import '../../../packages/elements/src/index.js';
import { clear, mount, parts, pause, settled, shown, stage, until } from './help.js';

interface Axe {
  run(context: unknown, options: unknown): Promise<{ violations: { id: string; nodes: { target: unknown; failureSummary?: string }[] }[] }>;
}
const axe = (globalThis as unknown as { axe: Axe }).axe;
const tags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];

async function violations(): Promise<string[]> {
  const found = await axe.run('#stage', { runOnly: tags });
  return found.violations.map(
    ({ id, nodes }) => `${id}: ${nodes.map(({ target, failureSummary }) => `${JSON.stringify(target)} ${failureSummary}`).join('; ')}`,
  );
}

interface Trio {
  station: RillageStation;
  reading: RillageReading;
  plot: RillageAgePlot;
}

async function trio(): Promise<Trio> {
  const { station: file } = await parts();
  document.documentElement.lang ||= 'en';
  document.title = 'Test page';
  const station = await mount('rillage-station', { station: file, staleAfter: 'never' });
  const reading = await mount('rillage-reading', {}, station);
  const plot = await mount('rillage-age-plot', { table: true }, station);
  await pause(60);
  return { station, reading, plot };
}

const emulate = (payload?: { media?: string; features?: { name: string; value: string }[] }): Promise<unknown> =>
  executeServerCommand('emulate', payload);
/** Where the driver cannot resize the window, the stage's own width is what the test holds things to. */
const resize = (width: number): Promise<void> => setViewport({ width, height: 800 }).catch(() => {});
/** Emulation is Chromium's own; in other engines the same assertions run on the page as it is. */
const feature = (name: string, value: string): Promise<unknown> => emulate({ features: [{ name, value }] });

describe('for everyone', () => {
  beforeEach(async () => {
    const meta = document.createElement('meta');
    Object.assign(meta, { name: 'color-scheme', content: 'light dark', id: 'scheme' });
    document.head.append(meta);
  });
  afterEach(async () => {
    document.querySelector('#scheme')?.remove();
    document.documentElement.style.removeProperty('font-size');
    await emulate();
    await resize(800);
    clear();
  });

  for (const scheme of ['light', 'dark']) {
    it(`axe finds nothing in ${scheme}, in any view`, async function () {
      this.timeout(60_000);
      await feature('prefers-color-scheme', scheme);
      const { plot } = await trio();
      for (const view of ['curve', 'density', 'drops'] as const) {
        plot.view = view;
        await settled(plot);
        expect(await violations()).to.deep.equal([]);
      }
    });
  }

  it('axe finds nothing in forced colours, nor in what the station says when it fails or is old', async function () {
    this.timeout(60_000);
    await feature('forced-colors', 'active');
    const { station } = await trio();
    station.staleAfter = '1';
    await settled(station);
    expect(shown(station)).to.contain('old');
    expect(await violations()).to.deep.equal([]);
    station.station = { kind: 'nonsense' } as never;
    await settled(station);
    expect(station.state).to.equal('failed');
    expect(await violations()).to.deep.equal([]);
  });

  it('axe finds nothing from right to left', async function () {
    this.timeout(60_000);
    document.documentElement.lang = 'ar';
    document.documentElement.dir = 'rtl';
    const { reading } = await trio();
    await until(() => shown(reading).includes('مياه'), 'Arabic');
    expect(await violations()).to.deep.equal([]);
  });

  it('paper and ink stay a legible pair on a page of any colour', async () => {
    document.body.style.background = '#000';
    try {
      const { reading } = await trio();
      const { color, backgroundColor } = getComputedStyle(reading);
      expect(color).not.to.equal(backgroundColor);
      expect(backgroundColor).not.to.equal('rgba(0, 0, 0, 0)');
    } finally {
      document.body.style.removeProperty('background');
    }
  });

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
        const { reading, plot } = await trio();
        await pause(100);
        const held = resized ? document.documentElement : stage();
        expect(held.scrollWidth).to.be.at.most(held.clientWidth);
        for (const element of [reading, plot]) {
          expect(element.scrollWidth, element.localName).to.be.at.most(Math.ceil(element.getBoundingClientRect().width) + 1);
        }
      });
    }
  }

  it('in forced colours, areas take no colour of ours and keep an outline', async () => {
    const { done } = (await feature('forced-colors', 'active')) as { done: boolean };
    const { plot } = await trio();
    const band = plot.shadowRoot!.querySelector('path.age-5')!;
    const canvas = document.createElement('span');
    canvas.style.color = 'Canvas';
    document.querySelector('#stage')!.append(canvas);
    if (done) expect(getComputedStyle(band).fill).to.equal(getComputedStyle(canvas).color);
    expect(getComputedStyle(plot.shadowRoot!.querySelector('path.line')!).stroke).not.to.equal('none');
  });

  it('prints picture and table, without buttons', async () => {
    const { plot } = await trio();
    const { distribution } = await parts();
    const ageDays = Float64Array.from(distribution.ageDays, (age) => age * 10);
    Object.assign(plot, { table: false, distribution: { ...distribution, ageDays, recordDays: 36530 } });
    await settled(plot);
    dispatchEvent(new Event('beforeprint'));
    const { done } = (await emulate({ media: 'print' })) as { done: boolean };
    await settled(plot);
    const root = plot.shadowRoot!;
    if (done) {
      expect(getComputedStyle(root.querySelector('.table')!).display).to.equal('block');
      expect(getComputedStyle(root.querySelector('button')!).display).to.equal('none');
    }
    expect(root.querySelectorAll('tbody tr').length).to.be.greaterThan(25);
    dispatchEvent(new Event('afterprint'));
    await settled(plot);
    expect(root.querySelectorAll('tbody tr').length).to.equal(25);
  });

  it('moves nothing by itself', async () => {
    const { reading, plot, station } = await trio();
    for (const element of [reading, plot, station]) {
      expect(element.getAnimations({ subtree: true }).length).to.equal(0);
      for (const node of element.shadowRoot!.querySelectorAll('*')) expect(getComputedStyle(node).transitionDuration).to.equal('0s');
    }
  });

  it('reads in order as text: name, sentence, date, numbers, caution', async () => {
    const { reading } = await trio();
    const text = shown(reading);
    const places = [
      'Invented Brook',
      'About 23 litres',
      'Data to the end',
      'Fell as rain within',
      'How sure',
      'What it rests on',
      'not a basis',
    ].map((words) => text.indexOf(words));
    expect(places).to.deep.equal([...places].sort((a, b) => a - b));
    expect(Math.min(...places)).to.be.at.least(0);
  });
});
