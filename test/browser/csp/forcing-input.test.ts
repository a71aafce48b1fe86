import { expect } from 'chai';
import { guessLayout } from '../../../packages/sdk/src/forcing/guessLayout.js';
import { readForcing } from '../../../packages/sdk/src/forcing/readForcing.js';

const pause = (milliseconds: number): Promise<void> => new Promise((done) => setTimeout(done, milliseconds));
const text = 'day,rain_mm,flow_mm\n2020-01-01,2.4,0.5\n2020-01-02,1,0.25\n2020-01-03,7,1\n';

describe('the intake under the strict policy', () => {
  const broken: string[] = [];
  before(() =>
    document.addEventListener('securitypolicyviolation', (event) => broken.push(`${event.violatedDirective}: ${event.blockedURI}`)),
  );

  it('loads from the single file, proposes, reads, plots, takes an edit, and breaks no rule', async () => {
    await import('../../../packages/elements/dist/rillage-desk.min.js' as string);
    const element = document.createElement('rillage-forcing-input');
    Object.assign(element, { guessLayout, readForcing, files: [{ name: 'day.csv', text }] });
    document.body.append(element);
    await pause(200);
    Object.assign(element, { layout: { ...element.layout!, grid: { zone: 'UTC' } } });
    await pause(50);
    const all = <Kind extends HTMLElement>(selector: string): Kind[] => [...element.shadowRoot!.querySelectorAll<Kind>(selector)];
    all('section > p > button')[0]!.click();
    await pause(300);
    expect(all('.picture svg .rain')).to.have.length(1);
    const line = all<HTMLInputElement>('[part="editor"] input[type="number"]')[0]!;
    line.value = '3';
    line.dispatchEvent(new Event('change'));
    await pause(50);
    all<HTMLInputElement>('[name="value"]')[0]!.value = '2';
    all('[part="editor"] button')[0]!.click();
    await pause(50);
    expect(all('[part="edit"]')).to.have.length(1);
    expect(getComputedStyle(all('.fields')[0]!).display, 'styles apply').to.equal('grid');
    expect(broken).to.deep.equal([]);
  });
});
