import { expect } from 'chai';
import type { RillageStation } from '@rillage/elements';

const bundle = '../../../../packages/elements/dist/rillage-elements.min.js';
const pause = (milliseconds: number): Promise<void> => new Promise((done) => setTimeout(done, milliseconds));

async function reading(): Promise<HTMLElement> {
  const station = document.createElement('rillage-station') as RillageStation;
  const inside = document.createElement('rillage-reading');
  station.append(inside);
  station.station = (await (await fetch(new URL('../../../fixtures/station.json', import.meta.url))).json()) as RillageStation['station'];
  document.body.append(station);
  await pause(200);
  return inside;
}
const sentence = (element: HTMLElement): string => element.shadowRoot!.querySelector('[part~="sentence"]')!.textContent!;

/* The header names `rillage-lit lit-html` and no 'allow-duplicates', as a page with a Lit of its own would. */
describe('a page with a Lit of its own under required trusted types', () => {
  const broken: string[] = [];
  before(() =>
    document.addEventListener('securitypolicyviolation', (event) => broken.push(`${event.violatedDirective}: ${event.blockedURI}`)),
  );

  it('has both at work, whichever came first, and breaks no rule', async () => {
    const { html, LitElement, render } = await import('lit');
    class OwnElement extends LitElement {
      override render(): unknown {
        return html`<p>The page’s own.</p>`;
      }
    }
    customElements.define('own-element', OwnElement);
    await import(bundle as string);
    expect(sentence(await reading())).to.contain('About 23 litres');
    const own = document.createElement('own-element') as InstanceType<typeof OwnElement>;
    document.body.append(own);
    await own.updateComplete;
    expect(own.shadowRoot!.textContent).to.contain('The page’s own.');
    const place = document.createElement('div');
    render(html`<b>${'also this'}</b>`, place);
    expect(place.textContent).to.equal('also this');
    expect(broken).to.deep.equal([]);
  });

  it('is left with the first copy when a second of ours is refused', async () => {
    const second = await import(`${bundle}?again` as string).then(
      () => null,
      (reason: unknown) => reason,
    );
    expect(second, 'the policy’s name is taken').to.be.instanceOf(TypeError);
    expect(sentence(await reading())).to.contain('About 23 litres');
  });
});
