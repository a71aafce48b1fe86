import { expect } from 'chai';
import { addMessages, defineAll, RillageReading, version } from '../../../packages/elements/src/index.js';
import { define } from '../../../packages/elements/src/shared/define.js';
import { clear, mount, parts, shown, stage, settled } from './help.js';

describe('define()', () => {
  const warnings: string[] = [];
  const real = console.warn;
  beforeEach(() => {
    warnings.length = 0;
    console.warn = (text: string) => warnings.push(text);
  });
  afterEach(() => {
    console.warn = real;
    clear();
  });

  it('lets the first definition win, and warns with both versions', () => {
    class Other extends HTMLElement {
      static version = '9.9.9';
    }
    expect(define('rillage-reading', Other)).to.equal(false);
    expect(customElements.get('rillage-reading')).to.equal(RillageReading);
    expect(warnings.length).to.equal(1);
    expect(warnings[0]).to.contain(version).and.contain('9.9.9').and.contain('<rillage-reading>');
  });

  it('says nothing when the same class comes again', () => {
    expect(define('rillage-reading', RillageReading)).to.equal(false);
    expect(warnings).to.deep.equal([]);
  });

  it('defineAll({ prefix }) defines all under another prefix, working among themselves', async () => {
    const tags = ['age-history', 'age-plot', 'column-view', 'explorer', 'fit-panel', 'forcing-input', 'reading', 'station'].map(
      (name) => `agency-${name}`,
    );
    expect(defineAll({ prefix: 'agency' })).to.deep.equal(tags);
    const station = Object.assign(document.createElement('agency-station'), { station: (await parts()).station });
    const reading = document.createElement('agency-reading');
    station.append(reading);
    stage().append(station);
    await settled(station, reading);
    expect(shown(reading)).to.contain('litres');
    expect(defineAll({ prefix: 'agency' })).to.deep.equal([]);
    expect(warnings.length).to.equal(tags.length);
  });

  it('defineAll() again defines nothing and says nothing', () => {
    expect(defineAll()).to.deep.equal([]);
    expect(warnings).to.deep.equal([]);
  });

  it('addMessages() brings a whole language', async () => {
    addMessages('eo', { 'reading.confidence': 'Kiom certe' });
    document.documentElement.lang = 'eo';
    const element = await mount('rillage-reading', { reading: (await parts()).reading });
    expect(shown(element)).to.contain('Kiom certe');
  });
});
