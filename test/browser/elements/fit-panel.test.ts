import { expect } from 'chai';
import { fitCatchment, runColumn, type Fit, type FitProblem, type Forcing, type Sample } from '@rillage/sdk';
import '../../../packages/elements/src/rillage-fit-panel/define.js';
import type { FitDetail, RillageFitPanel, SignOffDetail } from '../../../packages/elements/src/rillage-fit-panel/rillage-fit-panel.js';
import { expectAccessible } from '../support/axe.js';
import { viewport } from '../support/page.js';
import { clear, mount, settled, shown, until } from './help.js';

/** A year whose truth is known: a steady gamma selection, a bottle every ten days. */
function record(tracer = 'd18O'): { forcing: Forcing; samples: Sample[]; rainSamples: Sample[] } {
  const days = 400;
  let state = 7;
  const random = (): number => (state = (state * 16807) % 2147483647) / 2147483647;
  const series = (of: (k: number) => number): Float64Array => Float64Array.from({ length: days }, (_, k) => of(k));
  const forcing: Forcing = {
    start: '2020-01-01T00:00:00Z',
    stepDays: 1,
    inflow: series(() => (random() < 0.4 ? 8 * random() : 0)),
    outflows: { discharge: series((k) => 1 + 0.4 * Math.sin(k / 58)) },
    inflowConcentration: { [tracer]: series((k) => -9 + 4 * Math.sin(k / 58.1) + random()) },
  };
  const catchment = { initialStorage: 1000, selection: { discharge: { form: 'gamma' as const, shape: 0.6, scale: 200 } } };
  const run = runColumn({ ...catchment, tracers: { [tracer]: { preRecord: -9 } } }, forcing);
  const samples = Array.from({ length: 36 }, (_, n): Sample => {
    const at = new Date(Date.parse(forcing.start) + (40 + 10 * n + 0.5) * 86_400_000).toISOString();
    const value = run.outflows['discharge']!.concentration[tracer]![40 + 10 * n]! + 0.2 * (random() - 0.5);
    return { tracer, from: at, to: at, value, unit: 'permil', error: 0.05 };
  });
  return { forcing, samples, rainSamples: [] };
}

const quick: RillageFitPanel['fitCatchment'] = (problem, options) =>
  fitCatchment(problem, { ...options, workers: 0, effectiveSize: 40, rHat: 1.2, draws: 60, redistributions: 0 });
/** One unknown but the errors, so that a fit takes a second or two. */
const problem: Partial<FitProblem> = {
  catchment: {
    initialStorage: 1000,
    selection: { discharge: { form: 'gamma', shape: 0.6, scale: { prior: 'logUniform', low: 80, high: 500 } } },
    tracers: { d18O: { preRecord: -9 } },
  },
  errors: { d18O: { error: 'normal', constant: { prior: 'logUniform', low: 0.02, high: 0.5 } } },
};

const buttons = (panel: Element): HTMLButtonElement[] => [...panel.shadowRoot!.querySelectorAll('button')];
function press(panel: Element, words: string): void {
  const button = buttons(panel).find((each) => each.textContent!.trim() === words);
  if (!button)
    throw new Error(
      `no button ${words}; there are ${buttons(panel)
        .map((each) => each.textContent!.trim())
        .join(', ')}`,
    );
  button.click();
}
const fitOf = (panel: Element): Promise<FitDetail> =>
  new Promise((done) => panel.addEventListener('rillage-fit', (event) => done((event as CustomEvent<FitDetail>).detail), { once: true }));

let made: Fit | undefined;
async function fitted(): Promise<Fit> {
  return (made ??= await quick!({ ...problem, ...record() } as FitProblem, { seed: 1 }));
}

describe('rillage-fit-panel', () => {
  afterEach(clear);

  it('says that there is nothing to fit without a record, and without a tracer known on both sides', async () => {
    const panel = await mount('rillage-fit-panel');
    expect(shown(panel)).to.contain('no record');
    panel.record = { ...record(), samples: [] };
    await settled(panel);
    expect(shown(panel)).to.contain('nothing to fit to');
  });

  it('proposes what to try, and tells the page of every change', async () => {
    const panel = await mount('rillage-fit-panel', { record: record() });
    const told: FitProblem[] = [];
    panel.addEventListener('rillage-problem', ({ detail }) => told.push(detail.problem));
    const ticks = [...panel.shadowRoot!.querySelectorAll<HTMLInputElement>('.tick input')];
    expect(ticks.filter(({ checked }) => checked).length).to.equal(3);
    ticks[3]!.click();
    expect(Object.keys(told[0]!.otherCatchments!)).to.deep.equal(['gammaSteady', 'exponentialSteady']);
    await settled(panel);
    const low = panel.shadowRoot!.querySelector<HTMLInputElement>('.prior input')!;
    low.value = '700';
    low.dispatchEvent(new Event('change'));
    expect(told[1]!.catchment.initialStorage).to.include({ low: 700 });
    expect(panel.record!.samples).to.equal(told[1]!.samples.length ? panel.record!.samples : null);
  });

  it('fits, and says what came of it in words, numbers and a picture', async () => {
    const panel = await mount('rillage-fit-panel', { record: record(), problem, fitCatchment: quick });
    const done = fitOf(panel);
    press(panel, 'Fit');
    await settled(panel);
    expect(buttons(panel).some((each) => each.textContent!.trim() === 'Stop')).to.equal(true);
    const { fit } = await done;
    await settled(panel);
    expect(fit.converged).to.equal(true);
    const text = shown(panel);
    expect(text).to.match(/converged after/);
    expect(text).to.match(/discharge · scale .* informed by these data/);
    expect(text).to.match(/d18O: \d+ of 36 samples lie in their 5 to 95 % range/);
    const label = panel.shadowRoot!.querySelector('.scatter')!.getAttribute('aria-label');
    expect(label).to.match(/of 36 samples/);
    press(panel, 'Samples of d18O as a table');
    await settled(panel);
    expect(panel.shadowRoot!.querySelectorAll('tbody').length).to.be.at.least(4);
    await expectAccessible(panel);
  });

  it('stops at a press with a partial fit that cannot be signed, and goes on from there to the same draws', async () => {
    const panel = await mount('rillage-fit-panel', { record: record(), problem, fitCatchment: quick });
    const stopped = fitOf(panel);
    press(panel, 'Fit');
    await until(() => panel.shadowRoot!.textContent!.includes('runs, R-hat'), 'the fit is under way');
    press(panel, 'Stop');
    expect((await stopped).fit.partial).to.equal(true);
    await settled(panel);
    expect(shown(panel)).to.contain('must not be published');
    const sign = buttons(panel).find((each) => each.textContent!.includes('Sign off'))!;
    expect(sign.disabled).to.equal(true);
    const whole = fitOf(panel);
    press(panel, 'Go on');
    const { fit } = await whole;
    expect(fit.alternatives[0]!.draws).to.deep.equal((await fitted()).alternatives[0]!.draws);
  });

  it('is signed by name and date, which the page hears', async () => {
    const panel = await mount('rillage-fit-panel', { record: record(), problem, fit: await fitted(), today: '2025-04-01' });
    const heard: SignOffDetail[] = [];
    panel.addEventListener('rillage-sign-off', ({ detail }) => heard.push(detail));
    const form = panel.shadowRoot!.querySelector('form')!;
    (form.elements.namedItem('by') as HTMLInputElement).value = ' A. Person ';
    form.requestSubmit();
    await settled(panel);
    expect(heard.map(({ name, date }) => `${name} ${date}`)).to.deep.equal(['A. Person 2025-04-01']);
    expect(shown(panel)).to.match(/Signed off by A\. Person on .*2025\./);
  });

  it('a change after the fit is said, and takes the sign-off away', async () => {
    const panel = await mount('rillage-fit-panel', { record: record(), problem, fit: await fitted() });
    panel.shadowRoot!.querySelectorAll<HTMLInputElement>('.tick input')[2]!.click();
    await settled(panel);
    expect(shown(panel)).to.contain('changed since this fit');
    expect(buttons(panel).find((each) => each.textContent!.includes('Sign off'))!.disabled).to.equal(true);
  });

  it('a refused problem is said in words, at the field it concerns', async () => {
    const wrong = structuredClone(problem);
    Object.assign((wrong.catchment!.selection['discharge'] as unknown as { scale: object }).scale, { low: 900 });
    const panel = await mount('rillage-fit-panel', { record: record(), problem: wrong, fitCatchment: quick });
    press(panel, 'Fit');
    await until(() => panel.shadowRoot!.querySelector('[role="alert"]'), 'the refusal is shown');
    expect(panel.shadowRoot!.querySelector('[role="alert"]')!.textContent).to.contain('discharge · scale');
    expect(panel.shadowRoot!.querySelector('[aria-invalid="true"]')).to.not.equal(null);
  });

  it('asks what would help and shows the plans', async () => {
    const plan = { tracer: 'd18O', of: 'discharge', when: 'lowFlow' as const, count: 12, narrowed: 0.3, effectiveDraws: 30 };
    const widths = { medianDays: { before: 40, after: 30 }, younger: { before: 0.04, after: 0.03 } };
    const help: RillageFitPanel['whatWouldHelp'] = () => Promise.resolve([{ ...plan, ...widths }]);
    const panel = await mount('rillage-fit-panel', { record: record(), problem, fit: await fitted(), whatWouldHelp: help });
    press(panel, 'Ask which further samples would narrow today’s ages most');
    await until(() => shown(panel).includes('12 of d18O, at low flow'), 'the plans are shown');
    expect(shown(panel)).to.contain('40, then 30');
  });

  it('German and Arabic, 320 px without a wider page, hostile names as text', async () => {
    const name = '<img src=x onerror=alert(1)>\u202e__proto__';
    const fit = JSON.parse(JSON.stringify(await fitted()).replaceAll('d18O', JSON.stringify(name).slice(1, -1))) as Fit;
    for (const lang of ['de', 'ar']) {
      document.documentElement.lang = lang;
      await viewport(320, 800);
      const panel = await mount('rillage-fit-panel', { record: record(name), fit });
      await until(() => shown(panel).includes(lang === 'de' ? 'Freigabe' : 'الاعتماد'), `${lang} has come`);
      expect(panel.shadowRoot!.querySelector('img')).to.equal(null);
      expect(document.documentElement.scrollWidth).to.be.at.most(document.documentElement.clientWidth);
      await expectAccessible(panel);
      clear();
    }
    await viewport(1000, 800);
  });
});
