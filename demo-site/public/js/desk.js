/**
 * Wires the desk: intake, fit, sign-off, station file. All that is computed is computed here, by the SDK, in this browser; the elements show and
 * ask. Work is kept in this browser through a reload, until the reader begins again.
 */
import {
  fitCatchment,
  fitSummary,
  guessLayout,
  makeStation,
  readForcing,
  READING_RUN_OPTIONS,
  runDrawsInBackground,
  whatWouldHelp,
  writeStation,
} from '../lib/rillage-sdk.min.js';
import { openKept } from './kept.js';

/** Runs of the fit in the station file: few enough for a file that a page can load. */
const MEMBERS = 24;
const INVENTED = ['weather.csv', 'flow.csv', 'rain-samples.csv', 'stream-samples.csv'];
const worker = new URL('../lib/rillage-worker.min.js', import.meta.url);

const at = (id) => document.getElementById(id);
const about = at('about');
const intake = at('intake');
const panel = at('panel');
const shown = at('shown');
const save = at('save');

const kept = await openKept('desk');
/** What a reload brings back: the station's name, files with their layout, whether they were handed over, what is fitted, the fit, who signed. */
let work = (await kept.read()) ?? {};
let record = null;

intake.guessLayout = guessLayout;
intake.readForcing = readForcing;
panel.fitCatchment = (problem, options) => fitCatchment(problem, { ...options, worker });
panel.whatWouldHelp = whatWouldHelp;
panel.today = new Date().toISOString().slice(0, 10);
at('kept').textContent = kept.lasts
  ? 'Your work is kept in this browser, through a reload, until you begin again.'
  : 'This browser keeps nothing for this page: a reload loses your work.';
restore();

about.addEventListener('input', () => keep({ about: fields() }));
intake.addEventListener('rillage-layout', ({ detail }) => keep({ files: detail.files.map(packed), layout: detail.layout }));
intake.addEventListener('rillage-forcing', ({ detail }) => {
  take(detail);
  keep({ handedOver: true, fit: null, problem: null, signedOff: null });
  say('The record is handed over to the fit below.');
});
panel.addEventListener('rillage-problem', ({ detail }) => keep({ problem: withoutRecord(detail.problem) }));
panel.addEventListener('rillage-fit', ({ detail }) => keep({ fit: detail.fit, problem: withoutRecord(detail.problem), signedOff: null }));
panel.addEventListener('rillage-sign-off', ({ detail }) => {
  keep({ signedOff: { by: detail.name, at: detail.date } });
  void publish(detail.fit, detail.problem);
});
at('bring').addEventListener('click', bring);
at('again').addEventListener('click', beginAgain);

/** The invented agency's files, as if its clerk had dropped them here. */
async function bring() {
  const texts = await Promise.all(INVENTED.map(async (name) => ({ name, text: await (await fetch(`./data/files/${name}`)).text() })));
  about.elements.id.value ||= 'thessle-brook';
  about.elements.name.value ||= 'Thessle Brook at Marrowgate';
  about.elements.invented.checked = true;
  intake.layout = null;
  intake.files = texts;
  keep({ about: fields(), files: texts, layout: null, handedOver: false });
}

function restore() {
  const { about: words, files, layout, handedOver, problem, fit, signedOff } = work;
  for (const [name, value] of Object.entries(words ?? {})) {
    const field = about.elements[name];
    if (field) field.type === 'checkbox' ? (field.checked = value) : (field.value = value);
  }
  if (!files?.length) return;
  const texts = files.map(unpacked);
  intake.layout = layout ?? null;
  intake.files = texts;
  if (!handedOver) return;
  try {
    take({ ...readForcing(texts, layout), layout });
  } catch {
    return; // the intake shows what stands in the way
  }
  if (problem) panel.problem = { ...problem, ...recordOf() };
  if (fit) panel.fit = fit;
  if (fit && problem && signedOff) void publish(fit, panel.problem);
}

/** Gives what was read to the fit. */
function take(read) {
  record = read;
  panel.record = recordOf();
  shown.hidden = true;
}

function recordOf() {
  const { forcing, samples, rainSamples } = record;
  return { forcing, samples, rainSamples };
}

/** Makes the station of a signed fit, shows what the public will read and offers the file. */
async function publish(fit, problem) {
  const { id, name, description, invented } = fields();
  say('The station file is being made.');
  try {
    const last = problem.forcing.inflow.length - 1;
    const runs = await runDrawsInBackground(fit, problem, { ...READING_RUN_OPTIONS, distributionsAt: [last] }, { count: MEMBERS });
    const bottles = [...new Set(problem.samples.map(({ to }) => to))].sort();
    const station = makeStation({
      id: id || 'station',
      name: name || 'A stream',
      ...(description ? { description } : {}),
      ...(invented ? { invented: true } : {}),
      forcing: problem.forcing,
      source: runs,
      receipt: record.receipt,
      language: document.documentElement.lang,
      fit: fitSummary(fit),
      samples: { count: bottles.length, last: bottles.at(-1) ?? null },
      signedOff: work.signedOff,
    });
    const text = writeStation(station);
    at('station').station = station;
    if (save.href) URL.revokeObjectURL(save.href);
    save.href = URL.createObjectURL(new Blob([text], { type: 'application/json' }));
    save.download = `${station.id}.json`;
    at('weight').textContent =
      `${station.id}.json, ${Math.round(text.length / 1000)} kB, signed off by ${work.signedOff.by} on ${work.signedOff.at}.`;
    shown.hidden = false;
    say('The station file is ready.');
  } catch (reason) {
    say(`No station file could be made: ${reason.message}`);
  }
}

async function beginAgain() {
  if (!window.confirm('Forget the files, the fit and the sign-off kept in this browser?')) return;
  await kept.clear();
  window.location.reload();
}

function fields() {
  const { id, name, description, invented } = about.elements;
  return { id: id.value, name: name.value, description: description.value, invented: invented.checked };
}

function keep(change) {
  work = { ...work, ...change };
  void kept.write(work);
}

/** The record is read again from its files; only the choices are kept. */
function withoutRecord({ forcing: _forcing, samples: _samples, rainSamples: _rainSamples, ...choices }) {
  return choices;
}

/** Bytes that are no text (another encoding) as numbers, since JSON has no bytes. */
function packed({ name, text }) {
  return typeof text === 'string' ? { name, text } : { name, bytes: Array.from(new Uint8Array(text)) };
}

function unpacked({ name, text, bytes }) {
  return { name, text: bytes ? Uint8Array.from(bytes) : text };
}

function say(words) {
  at('said').textContent = words;
}
