import { executeServerCommand } from '@web/test-runner-commands';
import { expect } from 'chai';
import { html, LitElement } from 'lit';
import { agePaint, PaintWatch, probe, probeStyles } from '../../../packages/elements/src/shared/paints.js';
import { theme } from '../../../packages/elements/src/shared/theme.js';
import { clear, pause, settled, stage, until } from './help.js';

class Canvas extends LitElement {
  static override styles = [theme, probeStyles];
  told = 0;
  watch = new PaintWatch(this, () => this.told++);
  override render() {
    return html`${probe}`;
  }
}
customElements.define('test-canvas', Canvas);

async function canvas(): Promise<Canvas> {
  const element = new Canvas();
  stage().append(element);
  await settled(element);
  return element;
}

describe('PaintWatch', () => {
  afterEach(async () => {
    await executeServerCommand('emulate', {});
    document.documentElement.removeAttribute('data-theme');
    clear();
  });

  it('read() gives colours as the browser computes them', async () => {
    const element = await canvas();
    element.style.setProperty('--rillage-age-3', 'rebeccapurple');
    const paints = element.watch.read();
    // Source: CSS Color 4, named colours: rebeccapurple is #663399.
    expect(paints['age-3']).to.equal('rgb(102, 51, 153)');
    expect(paints['age-1']).to.equal('rgb(228, 225, 172)');
    expect(paints.ink).to.match(/^rgb/);
  });

  it('agePaint() lies between the colours of the classes around an age', async () => {
    const paints = (await canvas()).watch.read();
    expect(agePaint(paints, 0.1)).to.equal('rgb(228 225 172)');
    expect(agePaint(paints, 1e6)).to.equal('rgb(48 17 74)');
    const [red] = /\d+/.exec(agePaint(paints, 7))!;
    expect(Number(red)).to.be.within(137, 228);
  });

  it('tells when the colour scheme, forced colours or print change, and when the page changes its theme', async () => {
    const element = await canvas();
    for (const payload of [
      { features: [{ name: 'prefers-color-scheme', value: 'dark' }] },
      { features: [{ name: 'forced-colors', value: 'active' }] },
      { media: 'print' },
    ]) {
      const before = element.told;
      const { done } = (await executeServerCommand('emulate', payload)) as { done: boolean };
      if (done) await until(() => element.told > before, JSON.stringify(payload));
    }
    const before = element.told;
    document.documentElement.dataset['theme'] = 'dark';
    await until(() => element.told > before, 'a theme attribute');
  });

  it('tells nothing after it has left the page', async () => {
    const element = await canvas();
    element.remove();
    const before = element.told;
    document.documentElement.dataset['theme'] = 'other';
    await executeServerCommand('emulate', { features: [{ name: 'prefers-color-scheme', value: 'dark' }] });
    await pause(50);
    expect(element.told).to.equal(before);
  });
});
