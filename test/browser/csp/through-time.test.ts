import { expect } from 'chai';
import { catchment, trial } from '../elements/record.js';

const pause = (milliseconds: number): Promise<void> => new Promise((done) => setTimeout(done, milliseconds));

describe('the pictures through time under the strict policy', () => {
  const broken: string[] = [];
  before(() =>
    document.addEventListener('securitypolicyviolation', (event) => broken.push(`${event.violatedDirective}: ${event.blockedURI}`)),
  );

  it('load from the single file, draw the bands, follow line and sliders, and break no rule', async () => {
    await import('../../../packages/elements/dist/rillage-elements.min.js' as string);
    const { section, history } = trial(3, catchment, 100);
    const explorer = document.createElement('rillage-explorer');
    const [view, past] = [document.createElement('rillage-column-view'), document.createElement('rillage-age-history')];
    explorer.append(view, past);
    let asked = 0;
    Object.assign(explorer, { catchment, compute: () => (asked++, { section, history }) });
    document.body.append(explorer);
    await pause(300);
    const bitmap = view.shadowRoot!.querySelector('canvas')!;
    const { data } = bitmap.getContext('2d')!.getImageData(0, 0, bitmap.width, bitmap.height);
    expect(data.filter((_, index) => index % 4 === 3).some((alpha) => alpha === 255)).to.equal(true);
    expect(past.shadowRoot!.querySelectorAll('path.area').length).to.equal(10);
    const picture = view.shadowRoot!.querySelector('.picture')!;
    picture.dispatchEvent(new KeyboardEvent('keydown', { key: 'Home', bubbles: true }));
    const slider = explorer.shadowRoot!.querySelector('input')!;
    slider.value = '10';
    slider.dispatchEvent(new Event('input'));
    await pause(300);
    expect(picture.getAttribute('aria-valuenow')).to.equal('0');
    expect(asked).to.equal(2);
    expect(getComputedStyle(view).display, 'styles apply').to.equal('block');
    expect(broken).to.deep.equal([]);
  });
});
