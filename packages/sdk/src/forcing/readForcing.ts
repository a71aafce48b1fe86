import type { Finding, Forcing, Receipt, Sample } from '../contract.js';
import { sha256Hex } from '../numeric/hash.js';
import { checkForcing } from './checkForcing.js';
import type { SnowRun } from './complete/degreeDaySnow.js';
import { Notebook } from './findings.js';
import type { Layout, SettledLayout } from './layout.js';
import type { RainFill } from './rain/fillRainConcentration.js';
import { assemble, type NamedPieces } from './read/assemble.js';
import { readSamples, type ReadSample } from './read/samples.js';
import { readSeries } from './read/series.js';
import { readTable } from './read/table.js';
import { settleLayout } from './settleLayout.js';
import { DEFAULT_BYTES, takeSources, type Sources, type SourceText } from './text/sources.js';

export interface ForcingRead {
  forcing: Forcing;
  /** Everything noticed, and what was done about it. */
  findings: Finding[];
  receipt: Receipt;
  /** Laboratory values of the stream, in order of time. */
  samples: Sample[];
  /** Those of rain, as intervals; `fillRainConcentration` can spread them again by another rule. */
  rainSamples: Sample[];
  /** By name: the series on the forcing's steps as read (`precipitation`, `tmin`, an outflow's name), before snow. */
  record: Map<string, Float64Array>;
  /** By name, where anything was: 1 in the steps of `record` that a gap rule filled. */
  filled: Map<string, Uint8Array>;
  /** The snow store's run, where the layout asks for one. */
  snow: SnowRun | null;
  /** By tracer: how rain samples were spread, with the error of each step for a fit. */
  rainFills: Map<string, RainFill>;
}

/**
 * Agency files to a forcing, under a settled layout. One source or several: rain, temperature, flow, stream samples and rain samples are one call.
 * Nothing is dropped or altered silently: each act is a finding, and the receipt repeats it.
 * @throws RillageError in one batch and with nothing partial; the codes stand in this room's README
 */
export function readForcing(sources: Sources, layout: Layout): ForcingRead {
  const settled = settleLayout(layout);
  const notebook = new Notebook();
  const texts = takeSources(sources, notebook, settled.limits.bytes);
  checkSettled(texts, settled, notebook);
  const { series, rainSamples, samples } = readAll(texts, settled, notebook);
  const assembled = assemble(series, rainSamples.map(withoutRow), settled, notebook);
  checkForcing(assembled.forcing).forEach((finding) => notebook.note(finding));
  const receipt: Receipt = {
    kind: 'rillage-receipt',
    version: 1,
    sources: texts.map(fingerprint),
    layout: settled,
    acts: notebook.findings,
  };
  return { ...assembled, findings: notebook.findings, receipt, samples: samples.map(withoutRow), rainSamples: rainSamples.map(withoutRow) };
}

/**
 * The laboratory values alone, for files that come after the record: stream samples and rain samples under the same kind of layout.
 * @throws RillageError as {@link readForcing}
 */
export function readSampleFiles(sources: Sources, layout: Layout): { samples: Sample[]; rainSamples: Sample[]; findings: Finding[] } {
  const settled = settleLayout(layout);
  const notebook = new Notebook();
  const texts = takeSources(sources, notebook, settled.limits.bytes);
  checkSettled(texts, settled, notebook);
  const { rainSamples, samples } = readAll(texts, settled, notebook);
  notebook.stopIfAny();
  return { samples: samples.map(withoutRow), rainSamples: rainSamples.map(withoutRow), findings: notebook.findings };
}

/** Source texts as the receipt names them. */
export function fingerprint({ name, text }: SourceText): Receipt['sources'][number] {
  const bytes = new TextEncoder().encode(text);
  return { name, sha256: sha256Hex(bytes), bytes: bytes.length };
}

/** Reads nothing before every question is settled, so that the caller learns all of them at once. */
function checkSettled(texts: readonly SourceText[], layout: SettledLayout, notebook: Notebook): void {
  if (texts.length !== layout.sources.length) {
    notebook.problem({
      code: 'layout-mismatch',
      path: 'sources',
      expected: `${layout.sources.length} sources, as the layout has`,
      received: String(texts.length),
    });
  }
  layout.sources.forEach((source, index) => (source.name ||= texts[index]?.name ?? `source ${index + 1}`));
  const ask = (path: string, expected: string): void =>
    notebook.problem({
      code: 'layout-unsettled',
      path,
      expected,
      received: 'none',
      hint: 'guessLayout leaves open what the file does not say.',
    });
  layout.sources.forEach(({ time }, index) => {
    if (time.writtenAs === null) ask(`sources[${index}].time.writtenAs`, 'how times are written: which of day and month comes first');
  });
  if (layout.grid.zone === null) ask('grid.zone', 'the zone of times that state none, and in which days begin, such as UTC or +01:00');
  notebook.stopIfAny();
}

function readAll(
  texts: readonly SourceText[],
  layout: SettledLayout,
  notebook: Notebook,
): { series: NamedPieces[]; rainSamples: ReadSample[]; samples: ReadSample[] } {
  const series: NamedPieces[] = [];
  const rainSamples: ReadSample[] = [];
  const samples: ReadSample[] = [];
  texts.forEach((text, index) => {
    const source = layout.sources[index];
    for (const cells of notebook.attempt(() => readTable(text, source, layout.limits, notebook), { path: source.name }, [])) {
      const { holds, as } = cells.column;
      if (holds === 'streamTracer') samples.push(...readSamples(cells, notebook));
      else if (holds === 'rainTracer') rainSamples.push(...readSamples(cells, notebook));
      else series.push({ name: as === '' ? holds : as, holds, pieces: readSeries(cells, layout.areaKm2, notebook) });
    }
  });
  notebook.stopIfAny();
  samples.sort((a, b) => a.from.localeCompare(b.from));
  return { series, rainSamples, samples };
}

function withoutRow({ row: _row, ...sample }: ReadSample): Sample {
  return sample;
}

/** Default cap on the size of one source, bytes. */
export const SOURCE_BYTES_CAP = DEFAULT_BYTES;
