import { RillageError } from '@rillage/sdk';
import { expect } from 'chai';

describe('@rillage/sdk in a browser', () => {
  it('throws the one error class, with its code', () => {
    const error = new RillageError({ code: 'negative-flux', path: 'inflow[3]', step: 3 });
    expect(error).to.be.instanceOf(Error);
    expect(error.code).to.equal('negative-flux');
  });
});
