import type { Receipt } from '../contract.js';
import { RillageError } from '../errors.js';
import type { Layout } from './layout.js';
import { fingerprint, readForcing, type ForcingRead } from './readForcing.js';
import { Notebook } from './findings.js';
import { takeSources, type Sources } from './text/sources.js';

/**
 * Reads the same sources again as a receipt says: the same forcing, number for number.
 * @throws RillageError 'receipt-invalid' | 'receipt-mismatch' where a source is not the one that was read, else as readForcing
 */
export function rerunReceipt(sources: Sources, receipt: Receipt): ForcingRead {
  const known = receipt as Partial<Receipt> | null;
  if (known?.kind !== 'rillage-receipt' || known.version !== 1 || !Array.isArray(known.sources)) {
    throw new RillageError({
      code: 'receipt-invalid',
      path: 'receipt',
      expected: 'a receipt of version 1',
      received: JSON.stringify(known?.kind ?? null),
    });
  }
  const layout = receipt.layout as Layout;
  const cap = (layout as Partial<Layout> | null)?.limits?.bytes;
  const texts = takeSources(sources, new Notebook(), typeof cap === 'number' ? cap : undefined);
  const issues = texts.flatMap((text, index) => {
    const expected = receipt.sources[index]?.sha256 ?? 'no further source';
    const { sha256 } = fingerprint(text);
    return sha256 === expected
      ? []
      : [
          {
            code: 'receipt-mismatch',
            path: text.name,
            expected,
            received: sha256,
            hint: 'The source has changed since. Read it anew and keep the new receipt.',
          },
        ];
  });
  if (texts.length < receipt.sources.length) {
    issues.push({
      code: 'receipt-mismatch',
      path: 'sources',
      expected: `${receipt.sources.length} sources`,
      received: String(texts.length),
      hint: 'Hand over every source, in the order of the receipt.',
    });
  }
  if (issues.length > 0) throw new RillageError(issues);
  return readForcing(sources, layout);
}
