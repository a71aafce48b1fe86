import { expect } from 'chai';
import type { RillageColumnView } from '../../../packages/elements/src/rillage-column-view/rillage-column-view.js';
import '../../../packages/elements/src/rillage-column-view/define.js';
import '../../../packages/elements/src/rillage-age-history/define.js';
import '../../../packages/elements/src/rillage-station/define.js';
import { clear, fixture, mount, part, pause, settled, shown } from './help.js';
import { trial } from './record.js';

const { section, history } = trial(10);
const all = (element: Element, selector: string): Element[] => [...element.shadowRoot!.querySelectorAll(selector)];
const readout = (element: Element): string => part(element, 'readout')!.textContent!.trim();
const live = (element: Element): string => element.shadowRoot!.querySelector('.unseen[role="status"]')!.textContent!.trim();
const button = (element: Element, text: string): HTMLButtonElement =>
  all(element, 'button').find((one) => one.textContent!.trim() === text) as HTMLButtonElement;
const place = (element: Element): number => Number(part(element, 'picture')!.getAttribute('aria-valuenow'));
const canvas = (element: Element): HTMLCanvasElement => element.shadowRoot!.querySelector('canvas')!;

async function press(element: RillageColumnView, ...keys: string[]): Promise<void> {
  const picture = part(element, 'picture')!;
  picture.focus();
  for (const key of keys) {
    picture.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }));
    await element.updateComplete;
  }
}

/** Colours of a vertical line of the bitmap, section and all, at a share of the time shown. */
function coloursAt(element: Element, share: number): string[] {
  const bitmap = canvas(element);
  const edge = element.shadowRoot!.querySelector('rect.edge')!;
  const svg = element.shadowRoot!.querySelector('.picture > svg') as SVGSVGElement;
  const scale = bitmap.width / svg.viewBox.baseVal.width;
  const number = (name: string): number => Number(edge.getAttribute(name)) * scale;
  const x = Math.round(number('x') + share * number('width'));
  const { data } = bitmap.getContext('2d')!.getImageData(x, Math.round(number('y')), 1, Math.round(number('height')));
  return Array.from({ length: data.length / 4 }, (_, index) => data.slice(4 * index, 4 * index + 4).join(' '));
}

describe('rillage-column-view: picture', () => {
  afterEach(clear);

  it('has a name, a summary, a focusable line with its moment, and a table', async () => {
    const element = await mount('rillage-column-view', { section });
    const picture = part(element, 'picture')!;
    expect(part(element, 'name')!.textContent).to.contain('The water in the ground').and.contain('its range is not assessed');
    expect(part(element, 'summary')!.textContent).to.contain('From January 2000 to December 2009').and.contain('Hatched');
    expect(picture.getAttribute('role')).to.equal('slider');
    expect(picture.tabIndex).to.equal(0);
    expect(picture.getAttribute('aria-valuetext')).to.match(/\d{4}$/);
    expect(all(element, 'table caption').length).to.equal(1);
  });

  it('colours bands light to dark downwards, and leaves what lies below the last known boundary without colour', async () => {
    const element = await mount('rillage-column-view', { section });
    const colours = coloursAt(element, 0.9);
    const luminance = (colour: string): number => {
      const [red, green, blue] = colour.split(' ').map(Number);
      return 0.2126 * red! + 0.7152 * green! + 0.0722 * blue!;
    };
    const opaque = colours.filter((colour) => colour.endsWith(' 255'));
    const known = section.columns[539]!.bottom.at(-1)!;
    expect(known).to.be.greaterThan(300);
    expect(opaque.length).to.be.greaterThan(100);
    expect(luminance(opaque[2]!)).to.be.greaterThan(luminance(opaque[opaque.length >> 1]!) + 40);
    expect(luminance(opaque[opaque.length >> 1]!)).to.be.greaterThan(luminance(opaque[opaque.length - 30]!) + 5);
    // the ground: ink strokes on nothing, no colour
    const bottom = colours.slice(-10).filter((colour) => !colour.endsWith(' 0'));
    for (const colour of bottom) {
      const [red, green, blue] = colour.split(' ').map(Number);
      expect(Math.max(red!, green!, blue!) - Math.min(red!, green!, blue!)).to.be.at.most(3);
    }
  });

  it('draws the bitmap once: moving the line leaves it alone', async () => {
    const element = await mount('rillage-column-view', { section });
    const context = canvas(element).getContext('2d')!;
    const before = canvas(element);
    context.clearRect(0, 0, 4, 4);
    context.fillStyle = '#123456';
    context.fillRect(0, 0, 2, 2);
    await press(element, 'Home', 'ArrowRight', 'PageUp', 'End', 'ArrowLeft');
    expect(canvas(element)).to.equal(before);
    expect([...context.getImageData(0, 0, 1, 1).data]).to.deep.equal([0x12, 0x34, 0x56, 255]);
  });

  it('moves the line over ten years in less than a frame', async () => {
    const element = await mount('rillage-column-view', { section });
    await press(element, 'Home');
    const times: number[] = [];
    for (let index = 0; index < 60; index++) {
      const began = performance.now();
      await press(element, 'ArrowRight');
      times.push(performance.now() - began);
    }
    times.sort((a, b) => a - b);
    // 16.7 ms a frame at 60 a second
    expect(times[30]!).to.be.lessThan(16.7);
  });

  it('draws what each outflow took beside the column: areas are shares of the outflow', async () => {
    const element = await mount('rillage-column-view', { section });
    const column = section.columns.at(-1)!;
    const widths = (name: string): number[] =>
      column.selection[name]!.map((share, row) => share - (row ? column.selection[name]![row - 1]! : 0));
    expect(widths('discharge').reduce((sum, share) => sum + share, 0)).to.be.closeTo(column.selection['discharge']!.at(-1)!, 1e-9);
    // The bar, then one profile for each outflow, each of layers in an outline.
    const rects = all(element, 'rect.layer').map((rect) => ({
      x: Number(rect.getAttribute('x')),
      area: Number(rect.getAttribute('width')) * Number(rect.getAttribute('height')),
    }));
    const starts = [...new Set(rects.map(({ x }) => x))];
    expect(starts.length).to.equal(3);
    const area = (start: number): number => rects.filter(({ x }) => x === start).reduce((sum, rect) => sum + rect.area, 0);
    // Both profiles have one scale, and what the uppermost layers exceed it by is cut off: 15 % of the whole at most.
    expect(area(starts[1]!) / area(starts[2]!)).to.be.within(0.85 * column.selection['discharge']!.at(-1)!, 1.1);
  });

  it('shows a tracer in tints of ink, on request', async () => {
    const element = await mount('rillage-column-view', { section });
    button(element, 'isotope, ‰').click();
    await settled(element);
    expect(element.tint).to.equal('isotope');
    for (const colour of coloursAt(element, 0.9)
      .filter((one) => one.endsWith(' 255'))
      .slice(0, 200)) {
      const [red, green, blue] = colour.split(' ').map(Number);
      expect(Math.max(red!, green!, blue!) - Math.min(red!, green!, blue!)).to.be.at.most(3);
    }
    element.tint = 'no such tracer';
    await settled(element);
    expect(button(element, 'Age').getAttribute('aria-pressed')).to.equal('true');
  });

  it('lets the ground fade where total storage is not informed, and says that its depth is not known', async () => {
    const open = { ...section, storageInformed: false };
    const element = await mount('rillage-column-view', { section: open });
    expect(part(element, 'summary')!.textContent).to.contain('how deep it reaches is not known');
    expect(readout(element)).to.contain('how much lies below is not known');
    const strength = (colours: string[]): number => colours.reduce((sum, colour) => sum + Number(colour.split(' ')[3]), 0);
    const below = coloursAt(element, 0.2);
    const known = below.findIndex((colour) => !colour.endsWith(' 255'));
    expect(strength(below.slice(known + 2, known + 62))).to.be.greaterThan(2 * strength(below.slice(-60)));
  });

  it('stays as it is, with its slot, for anything that is no section', async () => {
    const wrong: unknown[] = [null, {}, [], 'text', { ...section, columns: [] }, { ...section, version: 2 }, { ...section, kind: 'x' }];
    const [first] = section.columns;
    wrong.push({ ...section, columns: [{ ...first, bottom: [NaN] }] }, { ...section, columns: [{ ...first, oldest: [1, 2, 3] }] });
    wrong.push({ ...section, columns: [first, first] });
    for (const value of wrong) {
      const element = await mount('rillage-column-view', { section: value as never });
      expect(part(element, 'frame'), JSON.stringify(value)?.slice(0, 80)).to.equal(null);
      element.remove();
    }
  });

  it('shows hostile names as the characters they are', async () => {
    const evil = '<img src=x onerror=alert(1)>\u202Eevil';
    const columns = section.columns.map((column) => ({
      ...column,
      concentration: { [evil]: column.concentration['isotope']! },
      selection: { [evil]: column.selection['discharge']!, __proto__x: column.selection['evapotranspiration']! },
      flow: { [evil]: 1, __proto__x: 1 },
    }));
    const hostile = { ...section, columns, units: { [evil]: '<b>\u202E' } };
    const element = await mount('rillage-column-view', { section: hostile, table: true });
    expect(all(element, 'img, b').length).to.equal(0);
    expect(shown(element)).to.contain('<img src=x').and.not.contain('\u202E');
  });
});

describe('rillage-column-view: the line', () => {
  afterEach(clear);

  it('walks with ← → Home End, and by a season with PageUp and PageDown', async () => {
    const element = await mount('rillage-column-view', { section });
    const last = section.columns.length - 1;
    expect(place(element)).to.equal(last);
    await press(element, 'Home');
    expect(place(element)).to.equal(0);
    await press(element, 'ArrowRight', 'ArrowRight', 'ArrowLeft');
    expect(place(element)).to.equal(1);
    await press(element, 'PageUp');
    const days = (section.columns[place(element)]!.step - section.columns[1]!.step) * section.stepDays;
    expect(days).to.be.within(85, 97);
    await press(element, 'PageDown');
    expect(place(element)).to.equal(1);
    await press(element, 'Home', 'ArrowLeft', 'PageDown');
    expect(place(element)).to.equal(0);
    await press(element, 'End', 'ArrowRight', 'PageUp');
    expect(place(element)).to.equal(last);
  });

  it('has a button of at least 24 px for every way, disabled at the ends', async () => {
    const element = await mount('rillage-column-view', { section, table: true });
    expect(button(element, 'Later').disabled).to.equal(true);
    const last = place(element);
    button(element, 'Earlier').click();
    await settled(element);
    expect(place(element)).to.equal(last - 1);
    button(element, 'A season earlier').click();
    await settled(element);
    expect(place(element)).to.be.lessThan(last - 10);
    button(element, 'A season later').click();
    await settled(element);
    expect(place(element)).to.equal(last - 1);
    for (const one of all(element, 'button')) {
      const { width, height } = one.getBoundingClientRect();
      expect(Math.min(width, height), one.textContent!).to.be.at.least(24);
    }
  });

  it('tells where it went, with the moment at the end of that step', async () => {
    const element = await mount('rillage-column-view', { section });
    const told: (string | null)[] = [];
    element.addEventListener('rillage-cursor', ({ detail }) => told.push(detail.at));
    await press(element, 'Home');
    expect(told).to.deep.equal([new Date(Date.parse(section.start) + 86_400_000).toISOString()]);
    expect(element.at).to.equal(told[0]);
  });

  it('announces politely, once, what it came to rest on', async () => {
    const element = await mount('rillage-column-view', { section });
    const said: string[] = [];
    const observer = new MutationObserver(() => said.push(live(element)));
    observer.observe(element.shadowRoot!.querySelector('.unseen[role="status"]')!, { subtree: true, childList: true, characterData: true });
    await press(element, 'Home', 'ArrowRight', 'ArrowRight', 'ArrowRight');
    await pause(400);
    observer.disconnect();
    expect(said).to.deep.equal([readout(element)]);
    expect(said[0])
      .to.match(/mm in the ground fell within the record/)
      .and.match(/Stream: .* mm a day/);
  });

  it('states what is in the section: half depths and pre-record water', async () => {
    const element = await mount('rillage-column-view', { section });
    const column = section.columns.at(-1)!;
    const row = column.selection['discharge']!.findIndex((share) => share >= 0.5);
    const half = Number(/Stream: .*? uppermost ([\d,.]+) mm/.exec(readout(element))![1]!.replace(',', ''));
    expect(half).to.be.within(column.bottom[row - 1]! - 1, column.bottom[row]! + 1);
    expect(readout(element)).to.contain(`${new Intl.NumberFormat('en').format(Math.round(column.preRecordDepth))} mm lay there before`);
  });

  it('follows a press and a drag, not a hover, and leaves the cut alone', async () => {
    const element = await mount('rillage-column-view', { section });
    const picture = part(element, 'picture')!;
    const svg = element.shadowRoot!.querySelector('.picture > svg') as SVGSVGElement;
    const edge = element.shadowRoot!.querySelector('rect.edge')!;
    const box = svg.getBoundingClientRect();
    const x = (share: number): number =>
      box.left + ((Number(edge.getAttribute('x')) + share * Number(edge.getAttribute('width'))) / svg.viewBox.baseVal.width) * box.width;
    const send = async (type: string, clientX: number, buttons: number): Promise<void> => {
      picture.dispatchEvent(new PointerEvent(type, { clientX, clientY: box.top + 100, buttons, bubbles: true, cancelable: true }));
      await element.updateComplete;
    };
    const last = place(element);
    await send('pointermove', x(0.3), 0);
    expect(place(element)).to.equal(last);
    await send('pointerdown', x(0.5), 1);
    expect(place(element) / last).to.be.closeTo(0.5, 0.01);
    await send('pointermove', x(0.25), 1);
    expect(place(element) / last).to.be.closeTo(0.25, 0.01);
    if (svg.viewBox.baseVal.width > 620) {
      await send('pointerdown', x(1.2), 1);
      expect(place(element) / last).to.be.closeTo(0.25, 0.01);
    }
  });

  it('leaves other keys, and keys with a modifier, to the page', async () => {
    const element = await mount('rillage-column-view', { section });
    for (const init of [{ key: 'Tab' }, { key: 'Escape' }, { key: 'ArrowLeft', altKey: true }, { key: 'Home', ctrlKey: true }]) {
      const event = new KeyboardEvent('keydown', { ...init, bubbles: true, cancelable: true });
      part(element, 'picture')!.dispatchEvent(event);
      expect(event.defaultPrevented, init.key).to.equal(false);
    }
  });

  it('is linked with the history in the same station, both ways, and with none outside', async () => {
    const station = await mount('rillage-station', { station: await fixture(), staleAfter: 'never' });
    const element = await mount('rillage-column-view', { section }, station);
    const other = await mount('rillage-age-history', { history }, station);
    const outside = await mount('rillage-column-view', { section });
    await press(element, 'Home', 'ArrowRight');
    await settled(other);
    expect(other.shadowRoot!.querySelectorAll('line.cursor').length).to.equal(2);
    expect(place(outside)).to.equal(section.columns.length - 1);
    const picture = part(other, 'picture')!;
    picture.focus();
    picture.dispatchEvent(new KeyboardEvent('keydown', { key: 'End', bubbles: true, cancelable: true }));
    await settled(other, element);
    expect(place(element)).to.be.greaterThan(section.columns.length - 4);
  });
});

describe('rillage-column-view: table', () => {
  afterEach(clear);

  it('lists the column at the line, 25 layers a page, pre-record water last', async () => {
    const element = await mount('rillage-column-view', { section });
    expect(getComputedStyle(part(element, 'table')!.parentElement!).display).to.equal('none');
    button(element, 'Data table').click();
    await settled(element);
    expect(all(element, 'tbody tr').length).to.equal(25);
    expect(all(element, 'thead th').map((cell) => cell.textContent)).to.deep.equal([
      'Depth, mm',
      'Age',
      'Share of: Stream',
      'Share of: Evapotranspiration',
      'isotope, ‰',
    ]);
    const layers = section.columns.at(-1)!.bottom.length;
    for (let page = 0; page < Math.floor(layers / 25); page++) {
      button(element, 'Next rows').click();
      await settled(element);
    }
    expect(all(element, 'tbody tr').at(-1)!.textContent).to.contain('Before the record');
    await press(element, 'Home');
    expect(part(element, 'table')!.querySelector('caption')!.textContent).to.contain('January 1, 2000');
  });

  it('without a canvas, keeps words, cut and table, and shows the table unasked', async () => {
    const real = HTMLCanvasElement.prototype.getContext;
    HTMLCanvasElement.prototype.getContext = () => null;
    try {
      const element = await mount('rillage-column-view', { section });
      await settled(element);
      expect(shown(element)).to.contain('cannot be drawn here');
      expect(getComputedStyle(part(element, 'table')!.parentElement!).display).to.equal('block');
      expect(all(element, 'rect.layer').length).to.be.greaterThan(50);
      await press(element, 'Home');
      expect(place(element)).to.equal(0);
    } finally {
      HTMLCanvasElement.prototype.getContext = real;
    }
  });
});
