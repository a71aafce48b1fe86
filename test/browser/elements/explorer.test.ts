import { expect } from 'chai';
import type { Catchment } from '@rillage/sdk';
import type { ExploreRequest } from '../../../packages/elements/src/rillage-explorer/rillage-explorer.js';
import type { RillageExplorer } from '../../../packages/elements/src/rillage-explorer/rillage-explorer.js';
import type { ExploreResult } from '../../../packages/elements/src/rillage-explorer/hand-out.js';
import '../../../packages/elements/src/rillage-explorer/define.js';
import '../../../packages/elements/src/rillage-age-history/define.js';
import '../../../packages/elements/src/rillage-age-plot/define.js';
import '../../../packages/elements/src/rillage-column-view/define.js';
import { clear, mount, part, pause, settled, shown, stage, until } from './help.js';
import { catchment, trial } from './record.js';

const made = trial(1, catchment, 60);
const result: ExploreResult = { section: made.section, history: made.history, distribution: made.distribution };
const inputs = (element: Element): HTMLInputElement[] => [...element.shadowRoot!.querySelectorAll<HTMLInputElement>('input[type="range"]')];
const frame = (): Promise<unknown> => new Promise((done) => requestAnimationFrame(done));

function slide(input: HTMLInputElement, place: number, type: 'input' | 'change' = 'input'): void {
  input.value = String(place);
  input.dispatchEvent(new Event(type, { bubbles: true }));
}

async function explorer(compute: RillageExplorer['compute'], inside = ''): Promise<RillageExplorer> {
  const element = document.createElement('rillage-explorer');
  for (const tag of inside.split(' ').filter(Boolean)) element.append(document.createElement(tag));
  Object.assign(element, { catchment, compute });
  stage().append(element);
  await settled(element);
  await frame();
  await settled(element);
  return element;
}

describe('rillage-explorer', () => {
  afterEach(clear);

  it('has a slider for every parameter, a driven one at each of its ends, with label and value', async () => {
    const element = await explorer(() => result);
    const labels = [...element.shadowRoot!.querySelectorAll('label')].map((label) => label.textContent!.replace(/\s+/g, ' ').trim());
    expect(labels.filter((label) => !label.startsWith('Form'))).to.deep.equal([
      'Shape0.6',
      'Scale, mm, at -100 of storage above its start, mm700',
      'Scale, mm, at 100 of storage above its start, mm300',
      'Scale, mm110',
    ]);
    for (const input of inputs(element)) expect(input.getBoundingClientRect().height).to.be.at.least(24);
    expect(shown(element)).to.contain('not a fit to the data');
  });

  it('asks its compute property at first, and hands the parts to the elements inside', async () => {
    const asked: ExploreRequest[] = [];
    const element = await explorer((request) => {
      asked.push(request);
      return result;
    }, 'rillage-column-view rillage-age-plot rillage-age-history agency-column-view');
    expect(asked).to.deep.equal([{ catchment, settled: true }]);
    const [view, plot, history, prefixed] = [...element.children] as HTMLElement[];
    expect((view as unknown as ExploreResult).section).to.equal(result.section);
    expect((plot as unknown as ExploreResult).distribution).to.equal(result.distribution);
    expect((history as unknown as ExploreResult).history).to.equal(result.history);
    expect((prefixed as unknown as ExploreResult).section).to.equal(result.section);
    await settled(view!, plot!, history!);
    for (const child of [view!, plot!, history!]) expect(part(child, 'frame')).not.to.equal(null);
  });

  it('gathers moves to one request a frame, and draws the answer within it', async () => {
    const asked: ExploreRequest[] = [];
    const element = await explorer((request) => {
      asked.push(request);
      return { ...result };
    }, 'rillage-column-view');
    asked.length = 0;
    const [shape] = inputs(element);
    for (const place of [100, 120, 140]) slide(shape!, place);
    await frame();
    await pause(0);
    expect(asked.length).to.equal(1);
    expect(asked[0]!.settled).to.equal(false);
    const { selection } = asked[0]!.catchment;
    expect((selection['discharge'] as { shape: number }).shape).to.be.closeTo(0.1 * 50 ** (140 / 400), 0.005);
    expect(selection['evapotranspiration']).to.deep.equal(catchment.selection['evapotranspiration']);
    slide(shape!, 150, 'change');
    await frame();
    await pause(0);
    expect(asked[1]!.settled).to.equal(true);
  });

  it('changes one end of a driven parameter, and never the given catchment', async () => {
    const before = structuredClone(catchment);
    let last: Catchment | undefined;
    const element = await explorer((request) => {
      last = request.catchment;
      return result;
    });
    slide(inputs(element)[2]!, 400);
    await frame();
    await pause(0);
    expect((last!.selection['discharge'] as { scale: unknown }).scale).to.deep.equal({
      ...{ driver: 'storageAnomaly', at: [-100, 100], value: [700, 5000] },
    });
    expect(catchment).to.deep.equal(before);
  });

  it('changes the form, and back to how it was', async () => {
    let last: Catchment | undefined;
    const element = await explorer((request) => {
      last = request.catchment;
      return result;
    });
    const select = element.shadowRoot!.querySelector('select')!;
    select.value = 'uniform';
    select.dispatchEvent(new Event('change'));
    await frame();
    await settled(element);
    expect(last!.selection['discharge']).to.deep.equal({ form: 'uniform', depth: 1000 });
    expect(shown(element)).to.contain('Depth, mm');
    const reset = element.shadowRoot!.querySelector('button')!;
    expect(reset.disabled).to.equal(false);
    reset.click();
    await frame();
    await settled(element);
    expect(last).to.equal(catchment);
    expect(select.value).to.equal('gamma');
  });

  it('asks by the event where there is no compute, and takes the answer through it', async () => {
    let settledAs: boolean | undefined;
    (stage() as HTMLElement).addEventListener('rillage-explore', ({ detail }) => {
      settledAs = detail.settled;
      detail.respond(result);
    });
    const element = await explorer(null, 'rillage-column-view');
    expect(settledAs).to.equal(true);
    expect(element.result).to.equal(result);
  });

  it('drops an answer that a later request has overtaken', async () => {
    const answers: ((result: ExploreResult) => void)[] = [];
    const element = await explorer(() => new Promise<ExploreResult>((settle) => answers.push(settle)));
    expect(shown(element)).to.contain('Computing');
    slide(inputs(element)[0]!, 10);
    await frame();
    await pause(0);
    const [first, second] = [{ ...result }, { ...result }];
    answers[1]!(second);
    await settled(element);
    answers[0]!(first);
    await settled(element);
    expect(element.result).to.equal(second);
    expect(shown(element)).not.to.contain('Computing');
  });

  for (const [how, compute] of [
    ['throws', () => expect.fail('refused')],
    ['rejects', () => Promise.reject(new Error('refused'))],
  ] as const) {
    it(`says so where a computation ${how}, and keeps what was shown`, async () => {
      const element = await explorer(() => result, 'rillage-column-view');
      element.compute = compute as never;
      await until(() => shown(element).includes('could not be computed'), 'the words');
      expect(element.result).to.equal(result);
    });
  }

  it('shows only its slot for anything that is no catchment', async () => {
    for (const wrong of [null, {}, { selection: null }, { selection: { a: {} } }, 'x'])
      expect(part(await mount('rillage-explorer', { catchment: wrong as never }), 'name')).to.equal(null);
  });

  it('shows hostile names as the characters they are', async () => {
    const evil = '<img src=x onerror=alert(1)>\u202Eevil';
    const hostile = { ...catchment, selection: { [evil]: { form: evil, scale: 3 } } } as never;
    const element = await mount('rillage-explorer', { catchment: hostile, compute: () => result });
    expect(element.shadowRoot!.querySelectorAll('img').length).to.equal(0);
    expect(shown(element)).to.contain('<img src=x').and.not.contain('\u202E');
  });
});
