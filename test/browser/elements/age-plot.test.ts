import { expect } from 'chai';
import type { DistributionWithRange } from '@rillage/sdk';
import type { RillageAgePlot } from '../../../packages/elements/src/index.js';
import '../../../packages/elements/src/index.js';
import { clear, mount, part, parts, pause, settled, shown, until } from './help.js';

const bareOf = (distribution: DistributionWithRange): DistributionWithRange => ({
  ...distribution,
  low: null,
  high: null,
  preRecordRange: null,
});
const all = (element: Element, selector: string): Element[] => [...element.shadowRoot!.querySelectorAll(selector)];
const readout = (element: Element): string => part(element, 'readout')!.textContent!.trim();
const live = (element: Element): string => element.shadowRoot!.querySelector('.picture ~ [role="status"]')!.textContent!.trim();
const button = (element: Element, text: string): HTMLButtonElement =>
  all(element, 'button').find((one) => one.textContent!.trim() === text) as HTMLButtonElement;

async function press(element: RillageAgePlot, ...keys: string[]): Promise<void> {
  const picture = part(element, 'picture')!;
  picture.focus();
  for (const key of keys) picture.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }));
  await settled(element);
}

describe('rillage-age-plot: picture', () => {
  afterEach(clear);

  it('has a name, a summary in words, a focusable picture and a table', async () => {
    const { distribution } = await parts();
    const element = await mount('rillage-age-plot', { distribution });
    const picture = part(element, 'picture')!;
    expect(part(element, 'name')!.textContent).to.contain('How old the water in the stream is');
    expect(picture.getAttribute('aria-label')).to.contain('How old the water in the stream is');
    expect(picture.tabIndex).to.equal(0);
    expect(part(element, 'summary')!.textContent)
      .to.contain('Half of the water is older than 8 to 23 months')
      .and.contain('22% is older than the record of 10 years');
    expect(all(element, 'table caption').length).to.equal(1);
  });

  it('draws the range as a band coloured by age without a middle line', async () => {
    const { distribution } = await parts();
    const element = await mount('rillage-age-plot', { distribution });
    expect(all(element, 'path[class^="age-"]').map((path) => path.getAttribute('class'))).to.deep.equal(
      ['age-1', 'age-2', 'age-3', 'age-4', 'age-5', 'age-6'].slice(0, all(element, 'path[class^="age-"]').length),
    );
    expect(all(element, 'path.line').length).to.equal(2);
  });

  it('ends at the record’s edge: no curve reaches into the hatched ground', async () => {
    const { distribution } = await parts();
    const element = await mount('rillage-age-plot', { distribution });
    const hatched = Math.min(...all(element, 'rect.ground').map((rect) => Number(rect.getAttribute('x'))));
    const drawn = all(element, 'path.line, path[class^="age-"]').map((path) => (path as SVGPathElement).getBBox());
    expect(Math.max(...drawn.map(({ x, width }) => x + width))).to.be.at.most(hatched + 0.1);
    expect(all(element, 'path.hatch').length).to.equal(2);
    expect(shown(element)).to.contain('Older than the record: 22% (17 to 27%)');
  });

  it('draws a bare line where no range was assessed, and says so', async () => {
    const { distribution } = await parts();
    const element = await mount('rillage-age-plot', { distribution: bareOf(distribution) });
    expect(all(element, 'path.line').length).to.equal(1);
    expect(readout(element)).to.contain('range is not assessed');
    expect(shown(element)).not.to.match(/NaN|undefined|null/);
  });

  for (const view of ['curve', 'density', 'drops'] as const) {
    for (const scale of ['log', 'linear'] as const) {
      it(`gives finite coordinates for ${view} on a ${scale} axis, with and without a range, in records from a day to a century`, async () => {
        const { distribution } = await parts();
        const element = await mount('rillage-age-plot', { view, scale });
        for (const recordDays of [1, 20, 400, 36525]) {
          const ageDays = Array.from(distribution.ageDays, (age) => (age * recordDays) / 3653);
          for (const one of [distribution, bareOf(distribution)]) {
            element.distribution = { ...one, ageDays: Float64Array.from(ageDays), recordDays };
            await settled(element);
            const values = all(element, 'svg *').flatMap((node) => [...node.attributes].map(({ value }) => value));
            expect(
              values.filter((value) => /NaN|Infinity|undefined/.test(value)),
              `${recordDays} days`,
            ).to.deep.equal([]);
            expect(shown(element)).not.to.match(/NaN|Infinity|undefined/);
          }
        }
      });
    }
  }

  it('places twenty drops, each with its range, the oldest hatched', async () => {
    const { distribution } = await parts();
    const element = await mount('rillage-age-plot', { distribution, view: 'drops' });
    const coloured = all(element, 'path.ink[class^="age-"]').length;
    const hollow = all(element, 'path.ground.ink').length;
    expect(coloured + hollow).to.equal(20);
    expect(hollow, '21.6 % lie beyond the record').to.equal(4);
    expect(all(element, 'line.range').length).to.be.at.least(15);
  });

  it('bars add up to what lies within the record', async () => {
    const { distribution } = await parts();
    const element = await mount('rillage-age-plot', { distribution, view: 'density' });
    const heights = all(element, 'rect.bar').map((rect) => Number(rect.getAttribute('height')));
    const [whole, nothing] = all(element, 'line.hair[x2]')
      .filter((line) => line.getAttribute('y1') === line.getAttribute('y2'))
      .map((line) => Number(line.getAttribute('y1')))
      .sort((a, b) => a - b)
      .flatMap((y, index, ys) => (index === 0 || index === ys.length - 1 ? [y] : []));
    const top = parseFloat(all(element, 'text.end')[4]!.textContent!) / 100;
    const sum = (heights.reduce((total, height) => total + height, 0) / (nothing! - whole!)) * top;
    // Coordinates are exact; the axis label gives its top in whole per cent.
    expect(sum).to.be.closeTo(1 - distribution.preRecordShare, 1e-3);
  });

  it('uses neither style attributes nor a canvas', async () => {
    const { distribution } = await parts();
    const element = await mount('rillage-age-plot', { distribution, table: true });
    expect(all(element, '[style]').length).to.equal(0);
    expect(all(element, 'canvas').length).to.equal(0);
  });

  it('refuses a distribution that falls, and leaves the page’s text', async () => {
    const { distribution } = await parts();
    const youngerShare = Float64Array.from(distribution.youngerShare);
    youngerShare[20] = 0.01;
    const element = await mount('rillage-age-plot', { distribution: { ...distribution, youngerShare } });
    expect(element.shadowRoot!.querySelector('slot')).not.to.equal(null);
  });

  it('shows no picture of a withheld reading', async () => {
    const { station } = await parts();
    Object.assign(station.reading, { status: 'withheld', withheld: [{ code: 'noOutflow', because: 'none' }] });
    const around = await mount('rillage-station', { station });
    const element = await mount('rillage-age-plot', {}, around);
    expect(element.shadowRoot!.querySelector('slot')).not.to.equal(null);
  });

  it('keeps its picture within the width it is given', async () => {
    const { distribution } = await parts();
    const element = await mount('rillage-age-plot', { distribution });
    for (const width of ['280px', '700px']) {
      element.style.inlineSize = width;
      await until(() => element.shadowRoot!.querySelector('svg')!.viewBox.baseVal.width === parseInt(width), `drawn for ${width}`);
      expect(element.scrollWidth).to.be.at.most(parseInt(width));
    }
  });
});

describe('rillage-age-plot: keys', () => {
  afterEach(clear);

  it('walks the points with left and right, to the ends with Home and End, and away with Escape', async () => {
    const element = await mount('rillage-age-plot', { distribution: (await parts()).distribution });
    await press(element, 'Home');
    expect(readout(element)).to.contain('younger than 1 day');
    await press(element, 'ArrowRight');
    expect(readout(element)).to.contain('younger than 2 days');
    await press(element, 'ArrowLeft', 'ArrowLeft');
    expect(readout(element)).to.contain('younger than 1 day');
    await press(element, 'End');
    expect(readout(element)).to.contain('younger than 10 years');
    await press(element, 'ArrowRight');
    expect(readout(element)).to.contain('younger than 10 years');
    await press(element, 'Escape');
    expect(readout(element)).to.contain('The band is the likely range');
    expect(all(element, '.cursor').length).to.equal(0);
  });

  it('walks from the middle to the ends of the range with up and down', async () => {
    const element = await mount('rillage-age-plot', { distribution: (await parts()).distribution });
    await press(element, 'Home', 'ArrowDown');
    expect(readout(element)).to.contain('Upper end');
    await press(element, 'ArrowDown', 'ArrowDown');
    expect(readout(element)).to.contain('Lower end');
    await press(element, 'ArrowUp', 'ArrowUp', 'ArrowUp');
    expect(readout(element)).to.contain('likely range');
  });

  it('announces politely, once, what the cursor came to rest on', async () => {
    const element = await mount('rillage-age-plot', { distribution: (await parts()).distribution });
    const said: string[] = [];
    const region = element.shadowRoot!.querySelector('.picture ~ [role="status"]')!;
    const observer = new MutationObserver(() => said.push(live(element)));
    observer.observe(region, { subtree: true, childList: true, characterData: true });
    await press(element, 'Home', 'ArrowRight', 'ArrowRight', 'ArrowRight', 'ArrowRight');
    await pause(250);
    observer.disconnect();
    expect(said.length).to.equal(1);
    expect(said[0]).to.equal('14% is younger than 7 days; likely range 11 to 18%.');
  });

  it('leaves other keys, and keys with a modifier, to the page', async () => {
    const element = await mount('rillage-age-plot', { distribution: (await parts()).distribution });
    for (const init of [{ key: 'Tab' }, { key: 'PageDown' }, { key: 'Escape' }, { key: 'ArrowLeft', altKey: true }]) {
      const event = new KeyboardEvent('keydown', { ...init, bubbles: true, cancelable: true });
      part(element, 'picture')!.dispatchEvent(event);
      expect(event.defaultPrevented, init.key).to.equal(false);
    }
  });

  it('follows the pointer without announcing', async () => {
    const element = await mount('rillage-age-plot', { distribution: (await parts()).distribution });
    const picture = part(element, 'picture')!;
    const box = picture.getBoundingClientRect();
    picture.dispatchEvent(new PointerEvent('pointermove', { clientX: box.left + box.width / 2, clientY: box.top + 50, bubbles: true }));
    await settled(element);
    expect(readout(element)).to.match(/younger than/);
    await pause(200);
    expect(live(element)).to.equal('');
    picture.dispatchEvent(new PointerEvent('pointerleave'));
    await settled(element);
    expect(all(element, '.cursor').length).to.equal(0);
  });

  it('walks twenty drops, naming those beyond the record', async () => {
    const element = await mount('rillage-age-plot', { distribution: (await parts()).distribution, view: 'drops' });
    await press(element, 'End');
    expect(readout(element)).to.equal('Drop 20 of 20: older than the record, age not known.');
  });
});

describe('rillage-age-plot: buttons and table', () => {
  afterEach(clear);

  it('changes view and scale by buttons, and tells', async () => {
    const element = await mount('rillage-age-plot', { distribution: (await parts()).distribution });
    const told: unknown[] = [];
    element.addEventListener('rillage-view-change', (event) => told.push(event.detail));
    button(element, 'Drops').click();
    await settled(element);
    expect(element.getAttribute('view')).to.equal('drops');
    expect(button(element, 'Drops').getAttribute('aria-pressed')).to.equal('true');
    button(element, 'Stretched ages').click();
    await settled(element);
    expect(told).to.deep.equal([
      { view: 'drops', scale: 'log' },
      { view: 'drops', scale: 'linear' },
    ]);
  });

  it('shows the table on request, at most 25 rows a page', async () => {
    const { distribution } = await parts();
    const ageDays = Float64Array.from(distribution.ageDays, (age) => age * 10);
    const element = await mount('rillage-age-plot', { distribution: { ...distribution, ageDays, recordDays: 36530 } });
    expect(getComputedStyle(part(element, 'table')!.parentElement!).display).to.equal('none');
    button(element, 'Data table').click();
    await settled(element);
    expect(getComputedStyle(part(element, 'table')!.parentElement!).display).to.equal('block');
    expect(all(element, 'tbody tr').length).to.equal(25);
    expect(button(element, 'Previous rows').disabled).to.equal(true);
    button(element, 'Next rows').click();
    await settled(element);
    expect(all(element, 'tbody tr').length).to.be.within(1, 25);
    expect(shown(element)).to.match(/Rows 26 to \d+ of \d+/);
    expect(all(element, 'tbody th[scope="row"]').length).to.equal(all(element, 'tbody tr').length);
  });

  it('gives every button at least 24 px', async () => {
    const element = await mount('rillage-age-plot', { distribution: (await parts()).distribution, table: true });
    for (const one of all(element, 'button')) {
      const { width, height } = one.getBoundingClientRect();
      expect(Math.min(width, height), one.textContent!).to.be.at.least(24);
    }
  });

  it('keeps properties set before its upgrade', async () => {
    const { RillageAgePlot: Class } = await import('../../../packages/elements/src/index.js');
    const tag = `early-plot-${Date.now()}`;
    const element = Object.assign(document.createElement(tag), { distribution: (await parts()).distribution, view: 'drops' });
    document.body.append(element);
    customElements.define(tag, class extends Class {});
    await settled(element);
    expect(all(element, 'path.ink').length).to.equal(20);
    element.remove();
  });
});
