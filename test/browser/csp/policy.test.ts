import { expect } from 'chai';

describe('the strict policy of these tests', () => {
  it('is in force: markup from a string is refused', () => {
    expect(() => {
      document.createElement('div').innerHTML = '<p>refused</p>';
    }).to.throw(TypeError);
  });

  it('is in force: a policy of another name is refused', () => {
    const { trustedTypes } = globalThis as unknown as { trustedTypes: { createPolicy(name: string, rules: object): unknown } };
    expect(() => trustedTypes.createPolicy('another', {})).to.throw(TypeError);
  });

  it('lets the single-file build of the SDK load', async () => {
    const sdk = (await import('../../../packages/sdk/dist/rillage-sdk.min.js' as string)) as { RillageError: unknown };
    expect(sdk.RillageError).to.be.a('function');
  });
});
