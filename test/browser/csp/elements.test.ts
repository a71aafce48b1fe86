import { expect } from 'chai';
import type { RillageStation } from '@rillage/elements';

const pause = (milliseconds: number): Promise<void> => new Promise((done) => setTimeout(done, milliseconds));

describe('the elements under the strict policy', () => {
  const broken: string[] = [];
  before(() =>
    document.addEventListener('securitypolicyviolation', (event) => broken.push(`${event.violatedDirective}: ${event.blockedURI}`)),
  );

  it('load from the single file, show a reading and a picture, and break no rule', async () => {
    await import('../../../packages/elements/dist/rillage-elements.min.js' as string);
    const file = (await (await fetch(new URL('../../fixtures/station.json', import.meta.url))).json()) as unknown;
    const station = document.createElement('rillage-station') as RillageStation;
    const [reading, plot] = [document.createElement('rillage-reading'), document.createElement('rillage-age-plot')];
    station.append(reading, plot);
    station.station = file as RillageStation['station'];
    document.body.append(station);
    for (const lang of ['en', 'de', 'ar']) {
      document.documentElement.lang = lang;
      await pause(200);
      expect(reading.shadowRoot!.querySelector('[part~="sentence"]')!.textContent).to.match(/23|٢٣/);
    }
    expect(plot.shadowRoot!.querySelectorAll('path').length).to.be.greaterThan(4);
    expect(getComputedStyle(reading).display, 'styles apply').to.equal('block');
    expect(broken).to.deep.equal([]);
  });

  it('read a JSON child, which the policy does not touch', async () => {
    const text = await (await fetch(new URL('../../fixtures/station.json', import.meta.url))).text();
    const script = document.createElement('script');
    script.type = 'application/json';
    script.append(text);
    const station = document.createElement('rillage-station') as RillageStation;
    station.append(script);
    document.body.append(station);
    await pause(100);
    expect(station.view.station!.id).to.equal('invented-brook');
  });
});
