import { expect } from 'chai';
import type { Reading } from '@rillage/sdk';
import { addMessages } from '../../../packages/elements/src/index.js';
import { clear, mount, part, parts, settled, shown, stage, until } from './help.js';

/** As a single run gives it: nothing assessed, no prose. */
async function bare(): Promise<Reading> {
  const { reading } = await parts();
  reading.younger.forEach((younger) => (younger.range = null));
  reading.median!.range = null;
  reading.olderThanRecord.range = null;
  return { ...reading, sentence: '', sentences: [], confidence: 'notAssessed', confidenceBecause: [], trend: null };
}

describe('rillage-reading: what it says', () => {
  afterEach(clear);

  it('says the file’s own sentences in its language', async () => {
    const { reading } = await parts();
    document.documentElement.lang = 'en-GB';
    const element = await mount('rillage-reading', { reading });
    expect(part(element, 'sentence')!.textContent).to.equal(reading.sentences![0]);
    expect(part(element, 'rest')!.textContent).to.equal(reading.sentences!.slice(1).join(' '));
  });

  it('says number, range, date, trend, confidence with why, evidence and caution', async () => {
    const { reading } = await parts();
    document.documentElement.lang = 'en-GB';
    const element = await mount('rillage-reading', { reading });
    const text = shown(element);
    for (const words of [
      '23% 18 to 28%',
      'Data to the end of 14 March 2025',
      'Younger than usual for the season',
      'Tentative',
      'The ranges are wide.',
      '520 water samples',
      'flow.csv',
      'not a basis for drinking-water',
    ]) {
      expect(text).to.contain(words);
    }
    expect(part(element, 'date')!.querySelector('time')!.dateTime).to.equal(reading.at);
  });

  it('says the same from the numbers where the prose is missing', async () => {
    const { reading } = await parts();
    document.documentElement.lang = 'en-GB';
    const element = await mount('rillage-reading', { reading: { ...reading, sentence: '', sentences: [] } });
    await until(() => shown(element).includes('About'), 'composed');
    expect(part(element, 'sentence')!.textContent).to.equal(reading.sentences![0]);
    expect(part(element, 'rest')!.textContent).to.equal(reading.sentences!.slice(1).join(' '));
  });

  it('says "range not assessed" wherever a range is missing, and never NaN', async () => {
    const element = await mount('rillage-reading', { reading: await bare() });
    await until(() => shown(element).includes('About'), 'composed');
    const text = shown(element);
    expect(text.match(/range not assessed/g)!.length).to.equal(9);
    expect(text).not.to.match(/NaN|undefined|null|Infinity/);
    expect(element.shadowRoot!.querySelector('.strip [class^="age-"]'), 'no bar without a range').to.equal(null);
  });

  it('never says NaN or a median where nothing is known', async () => {
    const reading = await bare();
    reading.median = null;
    reading.younger.forEach((younger) => Object.assign(younger, { share: null }));
    reading.olderThanRecord.share = null;
    const element = await mount('rillage-reading', { reading });
    await until(() => shown(element).includes('No age is given'), 'composed');
    expect(shown(element))
      .to.contain('not known')
      .and.not.match(/NaN|undefined|null|Infinity/);
  });

  it('says "more than" for a median beyond the record', async () => {
    const reading = await bare();
    reading.median = { days: 3653, beyondRecord: true, range: null };
    const element = await mount('rillage-reading', { reading });
    await until(() => shown(element).includes('More than half'), 'composed');
    expect(shown(element)).to.contain('more than 10 years').and.not.contain('older than about');
  });

  it('bounds what a short record cannot place', async () => {
    const reading = await bare();
    reading.younger = [{ days: 30, share: 0.41, unplaced: 0.3, range: null }];
    const element = await mount('rillage-reading', { reading });
    await until(() => shown(element).includes('Between'), 'composed');
    expect(shown(element)).to.contain('Between 41 and 71 litres in 100').and.contain('at least 41%');
  });

  it('gives no number when withheld', async () => {
    const reading = await bare();
    Object.assign(reading, { status: 'withheld', withheld: [{ code: 'recordTooShort', because: 'the record is only 9 days long' }] });
    const element = await mount('rillage-reading', { reading });
    await until(() => shown(element).includes('No age is given'), 'composed');
    expect(shown(element)).to.contain('the record is only 9 days long');
    expect(part(element, 'table')).to.equal(null);
  });

  it('shows only sentence, date and caution in the compact form', async () => {
    const { reading } = await parts();
    const element = await mount('rillage-reading', { reading, form: 'compact' });
    expect(element.getAttribute('form')).to.equal('compact');
    for (const name of ['table', 'confidence', 'evidence', 'trend']) expect(part(element, name), name).to.equal(null);
    expect(part(element, 'caution')!.textContent).to.contain('not a basis for drinking-water');
  });

  it('refuses a reading that does not hold, and leaves the page’s text', async () => {
    const { reading } = await parts();
    reading.younger[0]!.share = NaN;
    const element = await mount('rillage-reading', { reading });
    expect(element.shadowRoot!.querySelector('slot')).not.to.equal(null);
    expect(shown(element)).to.equal('');
  });
});

describe('rillage-reading: languages', () => {
  afterEach(clear);

  it('says everything in German, with its decimal comma, from the numbers', async () => {
    const { reading } = await parts();
    reading.median = { days: 1500, beyondRecord: false, range: { low: 1000, high: 2000, highBeyondRecord: false } };
    document.documentElement.lang = 'de';
    const element = await mount('rillage-reading', { reading });
    await until(() => shown(element).includes('Etwa 23 von 100 Litern'), 'German');
    expect(shown(element)).to.contain('2,7 bis 5,5 Jahre').and.contain('14. März 2025').and.not.contain('litres');
    expect(element.shadowRoot!.querySelector('article')!.lang).to.equal('de');
    expect(part(element, 'confidence')!.querySelector('ul')!.lang, 'the file’s own words are marked as theirs').to.equal('en');
  });

  it('follows the nearest lang, from right to left too', async () => {
    const { reading } = await parts();
    document.documentElement.lang = 'en';
    const near = document.createElement('div');
    near.lang = 'ar';
    stage().append(near);
    const element = await mount('rillage-reading', { reading }, near);
    await until(() => shown(element).includes('مياه الجدول'), 'Arabic');
    const article = element.shadowRoot!.querySelector('article')!;
    expect(article.dir).to.equal('rtl');
    expect(getComputedStyle(part(element, 'sentence')!).direction).to.equal('rtl');
    near.lang = 'en';
    await until(() => shown(element).includes('litres'), 'back to English');
    expect(article.dir).to.equal('ltr');
  });

  it('speaks English whole where it lacks the language, numbers too', async () => {
    const { reading } = await parts();
    document.documentElement.lang = 'xx-invalid-!';
    const element = await mount('rillage-reading', { reading });
    expect(shown(element)).to.contain('March 14, 2025');
    expect(element.shadowRoot!.querySelector('article')!.lang).to.equal('en');
  });

  it('lets a page replace one message, and one element', async () => {
    const { reading } = await parts();
    const element = await mount('rillage-reading', { reading, messages: { 'reading.confidence': 'Sureness' } });
    expect(shown(element)).to.contain('Sureness');
    addMessages('en', { 'reading.evidence': 'Grounds {unknown}' });
    await settled(element);
    expect(shown(element)).to.contain('Grounds {unknown}');
    addMessages('en', { 'reading.evidence': 'What it rests on' });
  });
});

describe('rillage-reading: what comes from outside', () => {
  afterEach(clear);
  const hostile = '<img src=x onerror=alert(1)>\u202Egnp\u2066\u0000__proto__';

  it('shows hostile text as text, without marks that turn what follows', async () => {
    const { reading } = await parts();
    Object.assign(reading, { sentence: hostile, sentences: [hostile], caution: hostile, confidenceBecause: [hostile], of: hostile });
    reading.station = { id: hostile, name: hostile };
    Object.assign(reading.evidence, { method: hostile, version: hostile, sources: [{ name: hostile, sha256: hostile }] });
    const element = await mount('rillage-reading', { reading });
    expect(element.shadowRoot!.querySelector('img')).to.equal(null);
    expect(shown(element)).to.contain('<img src=x onerror=alert(1)>gnp__proto__');
    expect(element.shadowRoot!.textContent).not.to.match(/[\u202A-\u202E\u2066-\u2069]|\0/);
  });

  it('refuses a word it does not know where it chooses by one', async () => {
    const { reading } = await parts();
    const element = await mount('rillage-reading', { reading: { ...reading, confidence: '__proto__' as Reading['confidence'] } });
    expect(shown(element)).to.equal('');
  });

  it('cuts text of any length', async () => {
    const { reading } = await parts();
    Object.assign(reading, { sentence: 'x'.repeat(1_000_000), sentences: ['x'.repeat(1_000_000)], caution: 'y'.repeat(1_000_000) });
    const element = await mount('rillage-reading', { reading });
    expect(shown(element).length).to.be.lessThan(6000);
  });

  it('keeps properties set before its upgrade', async () => {
    const { reading } = await parts();
    const { RillageReading } = await import('../../../packages/elements/src/index.js');
    const tag = `early-reading-${Date.now()}`;
    const element = document.createElement(tag) as HTMLElement & { reading: Reading; form: string; youngerThan: number };
    Object.assign(element, { reading, form: 'compact' });
    element.setAttribute('younger-than', '7');
    stage().append(element);
    customElements.define(tag, class extends RillageReading {});
    await settled(element);
    expect(element.form).to.equal('compact');
    expect(element.youngerThan).to.equal(7);
    expect(shown(element)).to.contain('litres');
    expect(part(element, 'table')).to.equal(null);
  });

  it('touches nothing in its constructor', () => {
    const element = document.createElement('rillage-reading');
    expect(element.attributes.length).to.equal(0);
    expect(element.childNodes.length).to.equal(0);
    expect(element.shadowRoot).to.equal(null);
  });

  it('writes nothing to the page on an update that changes nothing', async () => {
    const { reading } = await parts();
    const element = await mount('rillage-reading', { reading });
    const records: MutationRecord[] = [];
    const observer = new MutationObserver((list) => records.push(...list));
    observer.observe(element.shadowRoot!, { subtree: true, childList: true, attributes: true, characterData: true });
    element.requestUpdate();
    await settled(element);
    observer.disconnect();
    expect(records.length).to.equal(0);
  });
});
