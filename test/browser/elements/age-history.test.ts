import { expect } from 'chai';
import type { Sample, StationHistory } from '@rillage/sdk';
import type { RillageAgeHistory } from '../../../packages/elements/src/rillage-age-history/rillage-age-history.js';
import '../../../packages/elements/src/rillage-age-history/define.js';
import '../../../packages/elements/src/rillage-station/define.js';
import { clear, fixture, mount, part, pause, settled, shown } from './help.js';
import { trial } from './record.js';

const { history } = trial(10);
const all = (element: Element, selector: string): Element[] => [...element.shadowRoot!.querySelectorAll(selector)];
const readout = (element: Element): string => part(element, 'readout')!.textContent!.trim();
const button = (element: Element, text: string): HTMLButtonElement =>
  all(element, 'button').find((one) => one.textContent!.trim() === text) as HTMLButtonElement;

async function press(element: RillageAgeHistory, ...keys: string[]): Promise<void> {
  const picture = part(element, 'picture')!;
  picture.focus();
  for (const key of keys) picture.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }));
  await settled(element);
}

const withRange: StationHistory = {
  ...history,
  medianLow: history.medianDays.map((days) => days && days * 0.7),
  medianHigh: history.medianDays.map((days) => days && days * 1.4),
};

describe('rillage-age-history: picture', () => {
  afterEach(clear);

  it('has a name, a summary with shares weighted by flow, a focusable picture and a table', async () => {
    const element = await mount('rillage-age-history', { history });
    let [all30, all0] = [0, 0];
    history.flow.forEach((flow, step) => {
      all0 += flow ?? 0;
      all30 += (flow ?? 0) * (history.younger['30']![step] ?? 0);
    });
    expect(part(element, 'summary')!.textContent).to.contain(`${Math.round((100 * all30) / all0)}% was younger than 30 days`);
    expect(part(element, 'picture')!.tabIndex).to.equal(0);
    expect(part(element, 'picture')!.getAttribute('aria-label')).to.contain('by the age of its water');
    expect(all(element, 'table caption').length).to.equal(1);
  });

  it('stacks the classes oldest at the base, pre-record water hatched and without colour', async () => {
    const element = await mount('rillage-age-history', { history });
    const areas = all(element, 'path.area').map((path) => path.getAttribute('class')!.replace('area ', ''));
    expect(areas).to.deep.equal([...Array<string[]>(2)].flatMap(() => ['age-5', 'age-4', 'age-3', 'age-2', 'age-1']));
    expect(all(element, 'path.hatch').length).to.be.at.least(2);
    const middle = (path: Element): number => {
      const { y, height } = (path as SVGPathElement).getBBox();
      return y + height / 2;
    };
    const [older, , , , youngest] = all(element, 'path.area');
    expect(middle(youngest!)).to.be.lessThan(middle(older!));
  });

  it('draws the median’s range as a band without a middle line, and a bare line where no range was assessed', async () => {
    const element = await mount('rillage-age-history', { history: withRange, below: 'median' });
    const strokes = (): number => all(element, 'path.line:not(.thin)').length;
    expect(all(element, 'path.band').length).to.be.greaterThan(0);
    expect(strokes()).to.equal(0);
    element.history = history;
    await settled(element);
    expect(all(element, 'path.band').length).to.equal(0);
    expect(strokes()).to.be.greaterThan(0);
    expect(readout(element)).to.contain('its range is not assessed');
  });

  it('hatches where the median is older than the record', async () => {
    const beyond = { ...history, medianBeyondRecord: history.flow.map((_, step): 0 | 1 => (step < 700 ? 1 : 0)) };
    const element = await mount('rillage-age-history', { history: beyond, below: 'median' });
    const hatches = all(element, 'path.hatch').map((path) => (path as SVGPathElement).getBBox());
    const lower = hatches.at(-2) ?? hatches.at(-1)!;
    expect(Math.max(...hatches.map(({ width }) => width))).to.be.greaterThan(80);
    expect(lower.width).to.be.greaterThan(0);
    await press(element, 'Home');
    expect(readout(element)).to.contain('more than half of the water is older than the record');
  });

  it('draws a tracer as a line, and bottles as circles with their error; a detection limit points away', async () => {
    const at = (step: number): string => new Date(Date.parse(history.start) + (step + 0.5) * 86_400_000).toISOString();
    const samples: Sample[] = [100, 900, 2000].map((step) => ({
      ...{ tracer: 'isotope', of: 'discharge', from: at(step), to: at(step), value: -9, unit: '‰', error: 0.2 },
    }));
    samples.push({ ...samples[0]!, from: at(1500), to: at(1500), censored: 'below' }, { ...samples[0]!, tracer: 'other' });
    const element = await mount('rillage-age-history', { history, below: 'isotope', samples });
    expect(all(element, 'circle.bottle').length).to.equal(3);
    expect(readout(element)).to.contain('circles are bottles');
    element.samples = [{ bad: true }, null, 'x'] as never;
    await settled(element);
    expect(all(element, 'circle.bottle').length).to.equal(0);
    expect(readout(element)).to.contain('no bottles are given');
  });

  it('stays as it is, with its slot, for anything that is no history', async () => {
    const wrong: unknown[] = [null, {}, { ...history, flow: [1] }, { ...history, younger: { x: history.younger['7'] } }];
    wrong.push({ ...history, medianDays: [1, 2] }, { ...history, start: 'yesterday' }, { ...history, flow: history.flow.map(() => 'a') });
    for (const value of wrong) {
      const element = await mount('rillage-age-history', { history: value as never });
      expect(part(element, 'frame')).to.equal(null);
      element.remove();
    }
  });

  it('takes its history from the station around, and shows none while the reading is withheld but for a dry day', async () => {
    const file = await fixture();
    const station = await mount('rillage-station', { station: { ...file, history }, staleAfter: 'never' });
    const element = await mount('rillage-age-history', {}, station);
    expect(part(element, 'frame')).not.to.equal(null);
    expect(shown(element)).to.contain('An invented station');
    const withheld = (code: string): void => {
      station.station = { ...file, history, reading: { ...file.reading, status: 'withheld', withheld: [{ code, because: '' }] } };
    };
    withheld('preRecordDominates');
    await settled(station, element);
    expect(part(element, 'frame')).to.equal(null);
    withheld('noOutflow');
    await settled(station, element);
    expect(part(element, 'frame')).not.to.equal(null);
  });

  it('shows hostile names as the characters they are', async () => {
    const evil = '<img src=x onerror=alert(1)>\u202Eevil';
    const hostile = { ...history, concentration: { [evil]: history.concentration['isotope']! } };
    const element = await mount('rillage-age-history', { history: hostile, below: evil, table: true });
    expect(all(element, 'img').length).to.equal(0);
    expect(shown(element)).to.contain('<img src=x').and.not.contain('\u202E');
  });
});

describe('rillage-age-history: cursor, zoom and table', () => {
  afterEach(clear);

  it('walks days and classes by keys, and says each', async () => {
    const element = await mount('rillage-age-history', { history: withRange });
    await press(element, 'End');
    expect(readout(element))
      .to.match(/up to 7 days: \d+%/)
      .and.match(/likely range \d/);
    await press(element, 'ArrowDown');
    expect(readout(element)).to.match(/of the water is up to 7 days\.$/);
    await press(element, 'ArrowDown', 'ArrowDown', 'ArrowDown', 'ArrowDown', 'ArrowDown', 'ArrowDown');
    expect(readout(element)).to.contain('half of the water is older than');
    await press(element, 'Escape');
    expect(all(element, 'line.cursor').length).to.equal(0);
  });

  it('announces politely, once, and tells where the cursor went and that it went away', async () => {
    const element = await mount('rillage-age-history', { history });
    const told: (string | null)[] = [];
    element.addEventListener('rillage-cursor', ({ detail }) => told.push(detail.at));
    await press(element, 'Home');
    await pause(250);
    expect(element.shadowRoot!.querySelector('.picture ~ [role="status"]')!.textContent!.trim()).to.equal(readout(element));
    await press(element, 'Escape');
    expect(told).to.deep.equal([new Date(Date.parse(history.start) + 86_400_000).toISOString(), null]);
  });

  it('zooms by buttons: closer, wider, earlier, later, all; each at least 24 px', async () => {
    const element = await mount('rillage-age-history', { history, table: true });
    const titled = (): string =>
      all(element, '.picture > svg text')
        .map((text) => text.textContent)
        .join(' ');
    expect(titled()).to.match(/means over \d+ days/);
    expect(button(element, 'Wider').disabled).to.equal(true);
    for (let index = 0; index < 5; index++) {
      button(element, 'Closer').click();
      await settled(element);
    }
    expect(titled()).not.to.contain('means over');
    expect(all(element, 'path.between.near').length).to.be.greaterThan(2);
    const before = part(element, 'summary')!.textContent;
    button(element, 'Earlier').click();
    await settled(element);
    expect(part(element, 'summary')!.textContent).not.to.equal(before);
    button(element, 'Later').click();
    await settled(element);
    expect(part(element, 'summary')!.textContent).to.equal(before);
    button(element, 'All').click();
    await settled(element);
    expect(button(element, 'All').disabled).to.equal(true);
    for (const one of all(element, 'button')) {
      const { width, height } = one.getBoundingClientRect();
      expect(Math.min(width, height), one.textContent!).to.be.at.least(24);
    }
  });

  it('zooms by a drag, not by a click, and drops a drag that the system takes over', async () => {
    const element = await mount('rillage-age-history', { history });
    const picture = part(element, 'picture')!;
    const box = (): DOMRect => element.shadowRoot!.querySelector('.picture > svg')!.getBoundingClientRect();
    const send = async (type: string, share: number, target: EventTarget = picture): Promise<void> => {
      const { left, width, top } = box();
      target.dispatchEvent(new PointerEvent(type, { clientX: left + share * width, clientY: top + 50, buttons: 1, bubbles: true }));
      await element.updateComplete;
    };
    const drag = async (from: number, to: number, end: string): Promise<void> => {
      await send('pointerdown', from);
      await send('pointermove', to);
      await send(end, to, window);
    };
    const before = part(element, 'summary')!.textContent;
    await drag(0.4, 0.402, 'pointerup');
    await drag(0.4, 0.6, 'pointercancel');
    expect(part(element, 'summary')!.textContent).to.equal(before);
    await drag(0.6, 0.4, 'pointerup');
    expect(part(element, 'summary')!.textContent)
      .to.match(/2003|2004/)
      .and.not.equal(before);
    expect(all(element, 'rect.chosen').length).to.equal(0);
  });

  it('lists the window as a table, 25 rows a page, at most about a year of rows', async () => {
    const element = await mount('rillage-age-history', { history, table: true });
    expect(all(element, 'tbody tr').length).to.equal(25);
    expect(all(element, 'thead th').map((cell) => cell.textContent)).to.deep.equal([
      'Day',
      'Stream, mm a day',
      'up to 7 days',
      '7 days to 30 days',
      '30 days to 3 months',
      '3 months to 12 months',
      'older than 12 months',
      'before the record',
      'Median age (range not assessed)',
    ]);
    Object.assign(element, { history: withRange, below: 'isotope' });
    await settled(element);
    expect(
      all(element, 'thead th')
        .map((cell) => cell.textContent)
        .slice(-3),
    ).to.deep.equal(['Median age', 'Median age, likely range', 'isotope, simulated']);
    expect(shown(element)).to.match(/Rows 1 to 25 of 3\d\d/);
    button(element, 'Next rows').click();
    await settled(element);
    expect(shown(element)).to.contain('Rows 26 to 50');
  });
});
