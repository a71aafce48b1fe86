import { expect } from 'chai';
import { guessLayout, readForcing, rerunReceipt, type Layout } from '@rillage/sdk';
import { recordFiles, recordLayout } from '../../../demo-site/service/thessle-brook.mjs';
import type {
  ForcingDetail,
  LayoutDetail,
  RillageForcingInput,
} from '../../../packages/elements/src/rillage-forcing-input/rillage-forcing-input.js';
import type { ForcingFile } from '../../../packages/elements/src/rillage-forcing-input/text-rows.js';
import '../../../packages/elements/src/rillage-forcing-input/define.js';
import { answering, clear, mount, part, settled, shown, until } from './help.js';

const network = window.fetch.bind(window);
const layout = recordLayout as unknown as Layout;
const calls = { guessLayout, readForcing };

/** The invented catchment's four files, as an agency would hand them over. */
const brook = (): Promise<ForcingFile[]> =>
  Promise.all(
    recordFiles.map(async (name: string) => ({
      name,
      text: await (await network(new URL(`../../../demo-site/data/thessle-brook/${name}`, import.meta.url))).text(),
    })),
  );
const small: ForcingFile[] = [
  { name: 'day.csv', text: 'day,rain_mm,flow_mm\n2020-01-01,2.4,0.5\n2020-01-02,-9999,0.25\n2020-01-03,x,1\n' },
];
const smallLayout: Layout = {
  sources: [
    {
      name: 'day.csv',
      time: { columns: [1], zone: 'UTC' },
      columns: [
        { position: 2, name: 'rain_mm', holds: 'precipitation', unit: 'mm' },
        { position: 3, name: 'flow_mm', holds: 'outflow', as: 'discharge', unit: 'mm', standsFor: 'totalFollowing' },
      ],
    },
  ],
};

function button(element: Element, words: string, among = 'button'): HTMLButtonElement {
  const found = [...element.shadowRoot!.querySelectorAll<HTMLButtonElement>(among)].find((one) => one.textContent!.includes(words));
  if (!found) throw new Error(`no button “${words}”`);
  return found;
}
/** The control under a label, the first within a group whose legend or summary holds some words. */
function control<Kind extends HTMLElement = HTMLInputElement>(element: Element, label: string, group = ''): Kind {
  for (const one of element.shadowRoot!.querySelectorAll('label')) {
    const around = one.closest('fieldset, details')?.querySelector('legend, summary')?.textContent ?? '';
    if (one.textContent!.trim().startsWith(label) && around.includes(group)) return one.querySelector<Kind>('input, select, textarea')!;
  }
  throw new Error(`no field “${label}” in “${group}”`);
}
async function give(element: RillageForcingInput, field: HTMLElement, value: string): Promise<void> {
  (field as HTMLInputElement).value = value;
  field.dispatchEvent(new Event('change', { bubbles: true }));
  await settled(element);
}
async function press(element: RillageForcingInput, words: string, among = 'button'): Promise<void> {
  button(element, words, among).click();
  await settled(element);
}
const heard = <Detail>(element: Element, type: string): Detail[] => {
  const details: Detail[] = [];
  element.addEventListener(type, (event) => details.push((event as CustomEvent<Detail>).detail));
  return details;
};

describe('rillage-forcing-input: from files to a forcing', () => {
  afterEach(clear);

  it('settles the whole invented record by its fields, and hands over what readForcing gives for the same texts and layout', async function () {
    this.timeout(60_000);
    const files = await brook();
    const element = await mount('rillage-forcing-input', { ...calls, files });
    const handed = heard<ForcingDetail>(element, 'rillage-forcing');
    const kept = heard<LayoutDetail>(element, 'rillage-layout');
    expect(part(element, 'open')!.textContent).to.contain('Zone of the clock').and.to.contain('Catchment area').and.to.contain('Latitude');
    await give(element, control(element, 'Zone', 'whole'), 'UTC');
    await give(element, control(element, 'Catchment area'), '23.4');
    await give(element, control(element, 'Latitude'), '51.3');
    expect(part(element, 'open')).to.equal(null);
    await give(element, control(element, 'Gaps: precipitation'), 'zero');
    await give(element, control(element, 'Gaps: highest temperature'), 'linear');
    await give(element, control(element, 'of at most', 'whole'), '1');
    await give(element, control(element, 'Gaps: discharge'), 'recession');
    for (const input of element.shadowRoot!.querySelectorAll<HTMLInputElement>('input[type="number"]')) {
      if (input.closest('label')!.textContent!.includes('of at most')) await give(element, input, '5');
    }
    await give(element, control(element, 'Rain without a sample'), 'amountWeightedMean');
    await give(element, control(element, 'times', 'whole'), '0.66');
    await give(element, control(element, 'First day'), '2015-04-01');
    await give(element, control(element, 'Ends before'), '2025-04-01');
    await give(element, control(element, 'Below detection', 'chloride'), 'half');
    await press(element, 'Confirm and read');
    expect(shown(element)).to.contain('To look at');
    await press(element, 'Use this record');
    expect(handed).to.have.length(1);
    const { forcing, receipt, samples, rainSamples, findings } = handed[0]!;
    const last = kept[kept.length - 1]!;
    expect(handed[0]!.layout).to.deep.equal(last.layout);
    const direct = readForcing(files, JSON.parse(JSON.stringify(last.layout)) as Layout);
    expect({ forcing, receipt, samples, rainSamples, findings }).to.deep.equal({
      forcing: direct.forcing,
      receipt: direct.receipt,
      samples: direct.samples,
      rainSamples: direct.rainSamples,
      findings: direct.findings,
    });
    // The reader's answers are those an agency wrote down by hand, so the water is the same.
    const byHand = readForcing(files, layout).forcing;
    expect([...forcing.inflow]).to.deep.equal([...byHand.inflow]);
    for (const [name, series] of Object.entries(byHand.outflows)) expect([...forcing.outflows[name]!]).to.deep.equal([...series]);
  });

  it('takes files of a drop and of the chooser, lists each with its lines, and removes one', async () => {
    const element = await mount('rillage-forcing-input', calls);
    const data = new DataTransfer();
    data.items.add(new File([small[0]!.text as string], 'day.csv'));
    const zone = element.shadowRoot!.querySelector('.drop')!;
    zone.dispatchEvent(new DragEvent('drop', { dataTransfer: data, bubbles: true, cancelable: true }));
    await until(() => element.files.length === 1, 'the dropped file is taken');
    await settled(element);
    expect(part(element, 'files')!.textContent).to.contain('day.csv').and.to.contain('4 lines');
    expect(element.layout!.sources[0]!.columns.map(({ holds }) => holds)).to.deep.equal(['precipitation', 'outflow']);
    const chooser = element.shadowRoot!.querySelector<HTMLInputElement>('input[type="file"]')!;
    expect(chooser.multiple).to.equal(true);
    chooser.files = data.files;
    chooser.dispatchEvent(new Event('change', { bubbles: true }));
    await until(() => element.files.length === 2, 'the chosen file is taken');
    await settled(element);
    expect(element.files.map(({ name }) => name)).to.deep.equal(['day.csv', 'day.csv (2)']);
    await press(element, 'Remove', '[part="files"] button');
    expect(element.files.map(({ name }) => name)).to.deep.equal(['day.csv (2)']);
    expect(element.layout!.sources.map(({ name }) => name)).to.deep.equal(['day.csv (2)']);
  });

  it('takes bytes as they are, so that what the reader makes of their encoding is a finding', async () => {
    const bytes = new Uint8Array([
      ...new TextEncoder().encode('day,rain,'),
      0xfc,
      ...new TextEncoder().encode('\n2020-01-01,1,2\n2020-01-02,1,2\n'),
    ]);
    const files = [{ name: 'old.csv', text: bytes }];
    const open: Layout = {
      sources: [{ time: { columns: [1], zone: 'UTC' }, columns: [{ position: 2, holds: 'precipitation', unit: 'mm' }] }],
    };
    const element = await mount('rillage-forcing-input', { ...calls, files, layout: open });
    await press(element, 'Confirm and read');
    expect(shown(element)).to.contain('windows-1252');
    expect(element.shadowRoot!.querySelector('pre')!.textContent).to.contain('day,rain,ü');
  });

  it('takes pasted rows', async () => {
    const element = await mount('rillage-forcing-input', calls);
    control<HTMLTextAreaElement>(element, 'Or paste').value = small[0]!.text as string;
    await press(element, 'Add the rows');
    expect(element.files).to.deep.equal([{ name: 'pasted 1', text: small[0]!.text }]);
    expect(control<HTMLTextAreaElement>(element, 'Or paste').value).to.equal('');
  });

  it('puts back what a page kept: files and layout, without a guess', async () => {
    const element = await mount('rillage-forcing-input', {
      readForcing,
      guessLayout: () => expect.fail('nothing is left to guess'),
      files: small,
      layout: JSON.parse(JSON.stringify(smallLayout)) as Layout,
    });
    expect(control(element, 'Unit', 'rain_mm').value).to.equal('mm');
    expect(control<HTMLSelectElement>(element, 'A value is', 'rain_mm').value).to.equal('totalFollowing');
  });

  it('keeps what was settled when a file is added, and awaits calls that run elsewhere', async () => {
    const element = await mount('rillage-forcing-input', {
      readForcing: async (files, given) => Promise.resolve(readForcing(files, given)),
      guessLayout: async (files) => Promise.resolve(guessLayout(files)),
      files: [{ name: 'a.csv', text: 'day,rain_mm\n2020-01-01,1\n2020-01-02,2\n' }],
    });
    await give(element, control(element, 'Means no value', 'rain'), '-1; n. d.');
    element.files = [...element.files, { name: 'b.csv', text: 'day,flow_mm\n2020-01-01,1\n2020-01-02,1\n' }];
    await settled(element);
    expect(element.layout!.sources.map(({ columns }) => columns[0]!.absent)).to.deep.equal([['-1', 'n. d.'], undefined]);
    await give(element, control(element, 'Zone', 'whole'), 'UTC');
    await press(element, 'Confirm and read');
    expect(shown(element)).to.contain('From January 1, 2020 to January 2, 2020: 3 mm of rain, 2 mm of flow');
  });

  it('drops the answer of a call that a later one has overtaken', async () => {
    const waiting: (() => void)[] = [];
    const element = await mount('rillage-forcing-input', {
      guessLayout: (files) => new Promise((done) => waiting.push(() => done(guessLayout(files)))),
    });
    element.files = [{ name: 'first.csv', text: 'day,rain_mm\n2020-01-01,1\n' }];
    await until(() => waiting.length === 1, 'the first is asked');
    element.files = [{ name: 'second.csv', text: 'day,flow_mm\n2020-01-01,1\n' }];
    await until(() => waiting.length === 2, 'the second is asked');
    waiting[1]!();
    await settled(element);
    waiting[0]!();
    await settled(element);
    expect(element.layout!.sources.map(({ name }) => name)).to.deep.equal(['second.csv']);
  });
});

describe('rillage-forcing-input: findings and edits', () => {
  afterEach(clear);

  it('shows what stops the reading beside its line, mends the value there, and the receipt carries the edit', async () => {
    const element = await mount('rillage-forcing-input', { ...calls, files: small, layout: smallLayout });
    const handed = heard<ForcingDetail>(element, 'rillage-forcing');
    const kept = heard<LayoutDetail>(element, 'rillage-layout');
    await press(element, 'Confirm and read');
    const problems = [...element.shadowRoot!.querySelectorAll('[part="finding"]')].map((one) => one.textContent!.replace(/\s+/g, ' '));
    expect(problems).to.have.length(2);
    expect(problems.find((text) => text.includes('not-a-number')))
      .to.contain('Line 4')
      .and.to.contain('2020-01-03,x,1');
    expect(problems.find((text) => text.includes('negative-flux')))
      .to.contain('Line 3')
      .and.to.contain('2020-01-02,-9999,0.25');
    await give(element, control(element, 'Means no value', 'rain'), '-9999');
    await give(element, control(element, 'Gaps: precipitation'), 'zero');
    await press(element, 'Confirm and read');
    await press(element, 'Change', '[part="finding"] button');
    expect(element.shadowRoot!.activeElement!.id).to.equal('editor');
    expect(control(element, 'Line').value).to.equal('4');
    expect(control<HTMLSelectElement>(element, 'Column').selectedOptions[0]!.textContent).to.equal('rain_mm: x');
    control(element, 'New value').value = '7.1';
    control(element, 'Why').value = 'read off the strip chart';
    await press(element, 'Record the change');
    const edit = { row: 4, position: 2, value: '7.1', why: 'read off the strip chart' };
    expect(kept[kept.length - 1]!.layout.sources[0]!.edits).to.deep.equal([edit]);
    expect(part(element, 'edit')!.textContent).to.contain('day.csv, Line 4: “x” becomes “7.1”.').and.to.contain('strip chart');
    await press(element, 'Confirm and read');
    expect(shown(element)).to.contain('cell-edited');
    await press(element, 'Use this record');
    const [{ forcing, receipt }] = handed as [ForcingDetail];
    expect([...forcing.inflow]).to.deep.equal([2.4, 0, 7.1]);
    expect((receipt.layout as { sources: { edits: unknown }[] }).sources[0]!.edits).to.deep.equal([edit]);
    expect(rerunReceipt(small, JSON.parse(JSON.stringify(receipt))).forcing).to.deep.equal(forcing);
  });

  it('takes an edit back, and asks to read again before a changed record can be used', async () => {
    const edited = structuredClone(smallLayout);
    edited.sources[0]!.edits = [
      { row: 3, position: 2, value: '0' },
      { row: 4, position: 2, value: '1' },
    ];
    const element = await mount('rillage-forcing-input', { ...calls, files: small, layout: edited });
    await press(element, 'Confirm and read');
    expect(button(element, 'Use this record').disabled).to.equal(false);
    await press(element, 'Take back');
    expect(element.layout!.sources[0]!.edits).to.deep.equal([{ row: 4, position: 2, value: '1' }]);
    expect(button(element, 'Use this record').disabled).to.equal(true);
    expect(shown(element)).to.contain('Read again');
    expect(edited.sources[0]!.edits).to.have.length(2);
  });

  it('offers no change where no row of values stands', async () => {
    const files = [{ name: 'day.csv', text: `# a remark\n${small[0]!.text as string}` }];
    const element = await mount('rillage-forcing-input', { ...calls, files, layout: smallLayout });
    await press(element, 'Confirm and read');
    await give(element, control(element, 'Line'), '1');
    expect(shown(element)).to.contain('No row of values stands there');
    expect(button(element, 'Record the change').disabled).to.equal(true);
    await give(element, control(element, 'Line'), '3');
    expect(button(element, 'Record the change').disabled).to.equal(false);
  });

  it('says what a guess could not take: a web page, an empty file', async () => {
    const element = await mount('rillage-forcing-input', { ...calls, files: [{ name: 'page.csv', text: '<!doctype html><p>sign in' }] });
    expect(shown(element)).to.contain('html-instead').and.to.contain('page.csv');
    element.files = [];
    await settled(element);
    expect(shown(element)).not.to.contain('html-instead');
  });

  it('says in plain words what no error of ours says', async () => {
    const element = await mount('rillage-forcing-input', {
      readForcing: () => Promise.reject(new Error('the worker is gone')),
      files: small,
      layout: smallLayout,
    });
    await press(element, 'Confirm and read');
    expect(shown(element)).to.contain('This did not work: the worker is gone');
  });

  it('lists the headers for the reader to say where no column says when', async () => {
    const element = await mount('rillage-forcing-input', { ...calls, files: [{ name: 'odd.csv', text: 'when,rain\nfoo,1\nbar,2\n' }] });
    expect(element.layout!.sources[0]!.columns.map(({ name, holds }) => [name, holds])).to.deep.equal([
      ['when', 'ignored'],
      ['rain', 'ignored'],
    ]);
    expect(part(element, 'open')!.textContent).to.contain('Times are written');
    await press(element, 'Times are written');
    expect(element.shadowRoot!.activeElement).to.equal(control(element, 'Times are written'));
  });
});

describe('rillage-forcing-input: an address', () => {
  afterEach(clear);
  const fetched = async (
    answer: Parameters<typeof answering>[0],
    layoutGiven: Layout | null = null,
  ): Promise<[RillageForcingInput, string[]]> => {
    const element = await mount('rillage-forcing-input', { ...calls, src: './data/brook.csv?day=1', layout: layoutGiven });
    const { asked, stop } = answering(answer);
    try {
      await settled(element);
      expect(asked, 'nothing goes out before the reader asks').to.have.length(0);
      await press(element, 'Fetch');
      await until(() => element.files.length > 0 || /:/.test(element.shadowRoot!.querySelector('.state')!.textContent!), 'an answer');
      await settled(element);
    } finally {
      stop();
    }
    return [element, asked.map(({ url }) => url)];
  };

  it('is fetched on the reader’s press alone, and makes a file of its last part', async () => {
    const [element, asked] = await fetched(() => new Response(small[0]!.text as string, { headers: { 'content-type': 'text/csv' } }));
    expect(asked).to.deep.equal(['./data/brook.csv?day=1']);
    expect(element.files.map(({ name }) => name)).to.deep.equal(['brook.csv']);
    expect(element.layout!.sources[0]!.columns[0]!.holds).to.equal('precipitation');
  });

  for (const [what, answer, words] of [
    ['404', () => new Response('', { status: 404 }), 'there is no file at this address'],
    ['500', () => new Response('', { status: 500 }), 'the server answered with an error (500)'],
    ['a web page', () => new Response('<p>sign in', { headers: { 'content-type': 'text/html' } }), 'a web page, not rows'],
    [
      'a web page that says it is text',
      () => new Response('\n <!doctype html>', { headers: { 'content-type': 'text/plain' } }),
      'a web page',
    ],
    ['nothing', () => new Response(' \n'), 'the answer is empty'],
    ['no connection', () => Promise.reject(new TypeError('offline')), 'the server cannot be reached'],
  ] as const) {
    it(`says so where it gives ${what}`, async () => {
      const [element] = await fetched(answer);
      expect(shown(element)).to.contain(`brook.csv: ${words}`.slice(0, 11)).and.to.contain(words);
      expect(element.files).to.deep.equal([]);
    });
  }

  it('takes no more bytes than the cap, which it names', async () => {
    const [element] = await fetched(() => new Response('x'.repeat(2_000_001)), { sources: [], limits: { bytes: 2_000_000 } });
    expect(shown(element)).to.contain('the file is larger than 2 MB');
  });

  it('refuses a chosen file larger than the cap before it is read, and takes the others', async () => {
    const element = await mount('rillage-forcing-input', { ...calls, layout: { sources: [], limits: { bytes: 1_000_000 } } });
    const data = new DataTransfer();
    data.items.add(new File(['x'.repeat(1_000_001)], 'large.csv'));
    data.items.add(new File([small[0]!.text as string], 'day.csv'));
    element.shadowRoot!.querySelector('.drop')!.dispatchEvent(new DragEvent('drop', { dataTransfer: data }));
    await until(() => element.files.length === 1, 'the small one is taken');
    await settled(element);
    expect(element.files[0]!.name).to.equal('day.csv');
    expect(shown(element)).to.contain('large.csv: the file is larger than 1 MB');
  });

  it('names the cap on rows that the reader ran into', async () => {
    const element = await mount('rillage-forcing-input', { ...calls, files: small, layout: { ...smallLayout, limits: { rows: 2 } } });
    await press(element, 'Confirm and read');
    expect(shown(element)).to.contain('too-many-rows').and.to.contain('at most 2 rows');
  });
});
