import { expect, test } from 'vitest';
import { RillageError, selectionShare, type Selection } from '@rillage/sdk';

test('selectionShare refuses a driven parameter', () => {
  const driven: Selection = { form: 'exponential', scale: { driver: 'storage', at: [0, 1], value: [1, 2] } };
  const call = (): unknown => selectionShare(driven, [1], 10);
  expect(call).toThrow(RillageError);
  expect(call).toThrow(expect.objectContaining({ code: 'driver-needed' }));
});
