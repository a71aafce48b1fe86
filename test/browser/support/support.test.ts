import { expect } from 'chai';
import { expectAccessible } from './axe.js';
import { emulate, viewport } from './page.js';

const isChromium = /Chrome/.test(navigator.userAgent);

async function rejection(work: Promise<unknown>): Promise<Error> {
  return work.then(
    () => expect.fail('nothing was refused'),
    (reason: Error) => reason,
  );
}

describe('expectAccessible', () => {
  it('passes a labelled field and refuses an unlabelled one', async () => {
    const form = document.createElement('form');
    const field = document.createElement('input');
    const label = document.createElement('label');
    label.append('Name', field);
    form.append(label);
    document.body.append(form);
    await expectAccessible(form);
    form.replaceChildren(field);
    expect((await rejection(expectAccessible(form))).message).to.contain('label');
    form.remove();
  });
});

describe('emulate', () => {
  it('switches media on and off again, where the engine can', async () => {
    const dark = matchMedia('(prefers-color-scheme: dark)');
    const forced = matchMedia('(forced-colors: active)');
    const done = await emulate([
      { name: 'prefers-color-scheme', value: 'dark' },
      { name: 'forced-colors', value: 'active' },
    ]);
    expect(done).to.equal(isChromium);
    if (isChromium) expect([dark.matches, forced.matches]).to.deep.equal([true, true]);
    await emulate();
    expect(forced.matches).to.equal(false);
    await emulate([], 'print');
    expect(matchMedia('print').matches).to.equal(isChromium);
    await emulate();
  });
});

describe('viewport', () => {
  it('gives a page of 320 px, where the engine can', async () => {
    const set = await viewport(320);
    expect(innerWidth === 320).to.equal(set);
    await viewport(800, 600);
  });
});
