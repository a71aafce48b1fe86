/**
 * Wires the embed page. A control sets an attribute of the live element, and the snippet beside it is that element spelt out, so that the two
 * cannot differ. Nothing here writes markup from text.
 */
import { defineAll } from '../lib/rillage-elements.min.js';

const part = (demo, selector) => document.querySelector(`#demo-${demo} ${selector}`);
const tell = (demo, text) => (part(demo, '.snippet').textContent = text);

for (const demo of ['reading', 'picture']) {
  const station = part(demo, 'rillage-station');
  const show = () => tell(demo, spelt(station));
  for (const control of document.querySelectorAll(`#demo-${demo} [data-sets]`)) {
    const target = part(demo, `.live ${control.dataset.of}`);
    control.addEventListener('change', () => {
      set(target, control.dataset.sets, control.type === 'checkbox' ? (control.checked ? true : '') : control.value);
      show();
    });
  }
  // A button inside the element sets its attributes too; the controls follow.
  station.addEventListener('rillage-view-change', async ({ target }) => {
    await target.updateComplete;
    for (const control of document.querySelectorAll(`#demo-${demo} select[data-of="${target.localName}"]`)) {
      const { sets } = control.dataset;
      control.value = target.getAttribute(sets) === usual(target, sets) ? '' : target.getAttribute(sets);
    }
    show();
  });
  show();
}
offerColours();
offerWords();
offerEvents();
offerPrefix();
for (const form of document.querySelectorAll('form')) form.addEventListener('submit', (event) => event.preventDefault());

/** Empty means the element's own default, or no attribute where it has none. */
function set(element, name, value) {
  const wanted = value === '' ? usual(element, name) : value;
  if (wanted === true) element.setAttribute(name, '');
  else if (typeof wanted === 'string') element.setAttribute(name, wanted);
  else element.removeAttribute(name);
}

/** What a new element of that kind has. */
function usual(element, name) {
  const value = document.createElement(element.localName)[name];
  return value === '' ? null : value;
}

function offerColours() {
  const live = part('colours', '.live');
  const show = () => {
    const name = document.querySelector('#look').value;
    live.className = `live ${name}`;
    tell(
      'colours',
      rule(`.${name}`)
        ?.replaceAll('; ', ';\n  ')
        .replace('{ ', '{\n  ')
        .replace(/\s*\}$/, '\n}') ?? '',
    );
  };
  document.querySelector('#look').addEventListener('change', show);
  show();
}

/** A rule as the browser read it from the page's own style sheets. */
function rule(selector) {
  for (const sheet of document.styleSheets) {
    for (const each of sheet.cssRules) if (each.selectorText === selector) return each.cssText;
  }
  return undefined;
}

function offerWords() {
  const field = document.querySelector('#date-words');
  const show = () => {
    part('words', 'rillage-reading').messages = { 'reading.dateEnd': field.value };
    tell('words', `document.querySelector('rillage-reading').messages = {\n  'reading.dateEnd': ${quoted(field.value)},\n};`);
  };
  field.addEventListener('input', show);
  show();
}

function offerEvents() {
  const station = part('events', 'rillage-station');
  station.addEventListener('rillage-station-change', ({ detail: { state, reading } }) => {
    const entry = document.createElement('li');
    entry.textContent = `${state}${reading ? `, data to ${reading.at}` : ''}`;
    const log = document.querySelector('#said');
    log.prepend(entry);
    while (log.children.length > 6) log.lastElementChild.remove();
  });
  for (const button of document.querySelectorAll('#demo-events button')) {
    button.addEventListener('click', () => {
      station.src = button.dataset.src;
      show();
    });
  }
  const show = () =>
    tell(
      'events',
      [
        "const station = document.querySelector('rillage-station');",
        "station.addEventListener('rillage-station-change', ({ detail }) => {",
        '  console.log(detail.state, detail.reading?.at);',
        '});',
        `station.src = ${quoted(address(station.src))};`,
      ].join('\n'),
    );
  show();
}

function offerPrefix() {
  const field = document.querySelector('#prefix-name');
  const place = document.querySelector('#prefixed');
  const show = () => {
    const prefix = field.value;
    if (!field.checkValidity() || prefix === '') return;
    const station = document.createElement(`${prefix}-station`);
    const reading = document.createElement(`${prefix}-reading`);
    station.setAttribute('src', './data/ottering-beck-reading.json');
    station.setAttribute('stale-after', 'never');
    reading.setAttribute('form', 'compact');
    reading.textContent = 'Nothing has defined these tags yet.';
    station.append(reading);
    place.replaceChildren(station);
    tell(
      'prefix',
      `import { defineAll } from '/lib/rillage-elements.min.js';\n\ndefineAll({ prefix: ${quoted(prefix)} });\n\n${spelt(station)}`,
    );
  };
  field.addEventListener('input', show);
  document.querySelector('#define').addEventListener('click', () => {
    if (field.checkValidity() && field.value !== '') defineAll({ prefix: field.value });
  });
  show();
}

/** An element and what is inside as HTML, without what it sets itself or what is usual. */
function spelt(element, indent = '') {
  const attributes = [...element.attributes]
    .filter(({ name, value }) => !['state', 'id', 'class'].includes(name) && value !== usual(element, name))
    .map(({ name, value }) => (value === '' ? ` ${name}` : ` ${name}="${name === 'src' ? address(value) : value}"`))
    .join('');
  const open = `${indent}<${element.localName}${attributes}>`;
  const inner = [...element.children].map((child) => spelt(child, `${indent}  `));
  return inner.length > 0
    ? [open, ...inner, `${indent}</${element.localName}>`].join('\n')
    : `${open}${element.textContent.trim()}</${element.localName}>`;
}

/** The data lie elsewhere on a page of one's own. */
function address(value) {
  return value.replace('./data/', '/water/');
}

/** Text as a literal of a script. */
function quoted(text) {
  return `'${JSON.stringify(text).slice(1, -1).replaceAll('\\"', '"').replaceAll("'", "\\'")}'`;
}
