import { readForcing } from '@rillage/sdk';
import { rainUntilSampled, rowsLayout } from './thessle-brook.mjs';

/** The morning's rows as a forcing. */
export function forcingOfRows(text) {
  const { forcing, findings } = readForcing(text, rowsLayout);
  const inflowConcentration = Object.fromEntries(
    Object.entries(rainUntilSampled).map(([tracer, value]) => [tracer, new Float64Array(forcing.inflow.length).fill(value)]),
  );
  return { forcing: { ...forcing, inflowConcentration }, findings };
}
