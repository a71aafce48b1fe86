import { expect } from 'chai';
import type { StationView } from '../../../packages/elements/src/index.js';
import '../../../packages/elements/src/index.js';
import { address, answering, clear, fixture, json, mount, part, pause, settled, shown, stage, until } from './help.js';

const day = 86_400_000;

describe('rillage-station: states', () => {
  let network: ReturnType<typeof answering> | undefined;
  afterEach(() => {
    network?.stop();
    network = undefined;
    clear();
  });
  const fresh = async (): Promise<() => number> => {
    const { reading } = await fixture();
    return () => Date.parse(reading.at) + day;
  };

  it('says that it loads, then hands over what it loaded', async () => {
    const station = await fixture();
    let answer: (response: Response) => void = () => {};
    network = answering(() => new Promise((done) => (answer = done)));
    const element = await mount('rillage-station', { src: address(), clock: await fresh() });
    expect(element.state).to.equal('loading');
    expect(part(element, 'notice')!.getAttribute('role')).to.equal('status');
    expect(shown(element)).to.contain('Loading');
    await until(() => network!.asked.length === 1, 'one request');
    answer(json(station));
    await until(() => element.state === 'ready', 'ready');
    expect(element.getAttribute('state')).to.equal('ready');
    expect(shown(element)).to.equal('');
    expect(element.view.station!.id).to.equal(station.id);
  });

  const failures: [string, () => Response | Promise<Response>, RegExp][] = [
    ['a missing file', () => new Response('gone', { status: 404 }), /no file at this address/],
    ['a server error', () => new Response('', { status: 503 }), /error \(503\)/],
    ['a page instead of a file', () => new Response('<!doctype html><p>Log in', { headers: { 'content-type': 'text/html' } }), /web page/],
    ['a page that claims to be JSON', () => json('<!doctype html><p>Log in'), /web page/],
    ['an empty answer', () => json(''), /empty/],
    ['a truncated file', () => json('{"kind":"rillage-station","version":1,"id":'), /incomplete or damaged/],
    ['a file over the cap', () => json(`"${'x'.repeat(5_000_001)}"`), /larger than 5 MB/],
    [
      'text that is not UTF-8',
      () => new Response(new Uint8Array([123, 255, 254]), { headers: { 'content-type': 'application/json' } }),
      /incomplete or damaged/,
    ],
    ['a network that fails', () => Promise.reject(new TypeError('Failed to fetch')), /cannot be reached/],
    ['a foreign file', () => json({ kind: 'other' }), /not a station file \(kind\)/],
    ['a newer version', () => json({ kind: 'rillage-station', version: 2 }), /newer version \(2\)/],
    ['a 304 that nobody asked for', () => new Response(null, { status: 304 }), /empty/],
  ];
  for (const [what, answer, words] of failures) {
    it(`fails in words on ${what}, and leaves the page's own text`, async () => {
      network = answering(answer);
      const element = document.createElement('rillage-station');
      const reading = document.createElement('rillage-reading');
      reading.textContent = 'Call the office.';
      element.append(reading);
      element.src = address();
      stage().append(element);
      await until(() => element.state === 'failed', 'failed');
      await settled(element, reading);
      expect(shown(element)).to.match(words);
      expect(element.view.reading).to.equal(null);
      expect(reading.shadowRoot!.querySelector('slot')).not.to.equal(null);
    });
  }

  it('names the field of a file that does not hold, and shows none of it', async () => {
    const station = await fixture();
    (station.reading.younger[1] as { share: number }).share = 1.4;
    network = answering(() => json(station));
    const element = await mount('rillage-station', { src: address() });
    await until(() => element.state === 'failed', 'failed');
    await settled(element);
    expect(shown(element)).to.contain('reading.younger[1].share');
  });

  it('looks stale past stale-after, by the time of the data', async () => {
    const station = await fixture();
    const at = Date.parse(station.reading.at);
    const element = await mount('rillage-station', { station, staleAfter: '2', clock: () => at + 5.5 * day });
    expect(element.state).to.equal('stale');
    expect(shown(element)).to.contain('These data are old').and.contain('5 days ago');
    element.staleAfter = 'P10D';
    await settled(element);
    expect(element.state).to.equal('ready');
    element.staleAfter = 'never';
    element.clock = () => at + 5000 * day;
    await settled(element);
    expect(element.state).to.equal('ready');
    element.staleAfter = 'nonsense';
    await settled(element);
    expect(element.state, 'a misspelt patience is not endless').to.equal('stale');
  });

  it('asks to check the clock when the data are in the future', async () => {
    const station = await fixture();
    const element = await mount('rillage-station', { station, clock: () => Date.parse(station.reading.at) - 2 * day });
    expect(shown(element)).to.contain('check the clock');
  });

  it('says that a reading is withheld', async () => {
    const station = await fixture();
    Object.assign(station.reading, { status: 'withheld', withheld: [{ code: 'noOutflow', because: 'there was no outflow' }] });
    const element = await mount('rillage-station', { station, clock: await fresh() });
    expect(element.state).to.equal('withheld');
    expect(shown(element)).to.contain('No age is given');
  });

  it('is announced: one polite live region that stays in place from first to last', async () => {
    network = answering(() => Promise.reject(new TypeError('no network')));
    const element = await mount('rillage-station', { src: address() });
    const region = part(element, 'notice');
    await until(() => element.state === 'failed', 'failed');
    await settled(element);
    expect(part(element, 'notice')).to.equal(region);
    expect(region!.getAttribute('role')).to.equal('status');
  });
});

describe('rillage-station: kept copies', () => {
  let network: ReturnType<typeof answering> | undefined;
  afterEach(() => {
    network?.stop();
    clear();
  });

  it('shows the kept copy at once, asks with its ETag, and keeps it on 304', async () => {
    const station = await fixture();
    const src = address();
    network = answering(({ headers }) =>
      headers.get('if-none-match') === '"one"' ? new Response(null, { status: 304 }) : json(station, { etag: '"one"' }),
    );
    const clock = (): number => Date.parse(station.reading.at) + day;
    const first = await mount('rillage-station', { src, clock });
    await until(() => first.state === 'ready', 'first load');
    first.remove();
    const second = await mount('rillage-station', { src, clock });
    await until(() => second.state === 'ready', 'from the copy');
    await until(() => network!.asked.length === 2, 'asked again');
    expect(network.asked[1]!.headers.get('if-none-match')).to.equal('"one"');
    await pause(30);
    expect(second.state).to.equal('ready');
  });

  it('starts offline from the kept copy, and says so', async () => {
    const station = await fixture();
    const src = address();
    network = answering(() => json(station));
    const clock = (): number => Date.parse(station.reading.at) + day;
    const first = await mount('rillage-station', { src, clock });
    await until(() => first.state === 'ready', 'first load');
    await pause(100);
    first.remove();
    network.stop();
    network = answering(() => Promise.reject(new TypeError('Failed to fetch')));
    const second = await mount('rillage-station', { src, clock });
    await until(() => second.state === 'offline', 'offline');
    await settled(second);
    expect(second.view.reading!.sentence).to.equal(station.reading.sentence);
    expect(shown(second)).to.match(/No connection\. Shown is the copy kept on/);
  });

  it('keeps showing an earlier copy when the newest file is damaged, and says so', async () => {
    const station = await fixture();
    const src = address();
    let broken = false;
    network = answering(() => (broken ? json('{"kind":') : json(station)));
    const element = await mount('rillage-station', { src, clock: () => Date.parse(station.reading.at) });
    await until(() => element.state === 'ready', 'ready');
    broken = true;
    element.reload();
    await until(() => element.state === 'failed', 'failed');
    await settled(element);
    expect(element.view.reading).not.to.equal(null);
    expect(shown(element)).to.contain('Shown is an earlier copy');
  });

  it('works where storage throws at once, as in a sandboxed frame', async () => {
    const real = Object.getOwnPropertyDescriptor(IDBFactory.prototype, 'open')!;
    const station = await fixture();
    network = answering(() => json(station));
    // A cache that has already given up cannot be told from one that throws: a second copy of the module starts afresh.
    Object.defineProperty(IDBFactory.prototype, 'open', {
      ...real,
      value: () => {
        throw new DOMException('refused', 'SecurityError');
      },
    });
    try {
      const { openCache } = await import('../../../packages/elements/src/shared/storage.js');
      const cache = openCache('refused', (value): value is string => typeof value === 'string');
      expect(await cache.read('a')).to.equal(null);
      await cache.write('a', 'kept in memory');
      expect(await cache.read('a')).to.equal('kept in memory');
    } finally {
      Object.defineProperty(IDBFactory.prototype, 'open', real);
    }
  });

  it('does not wait for a storage that never answers', async () => {
    const real = Object.getOwnPropertyDescriptor(IDBFactory.prototype, 'open')!;
    Object.defineProperty(IDBFactory.prototype, 'open', { ...real, value: () => ({}) });
    try {
      const { openCache } = await import('../../../packages/elements/src/shared/storage.js');
      const cache = openCache('silent', (value): value is string => typeof value === 'string', 50);
      const began = performance.now();
      expect(await cache.read('a')).to.equal(null);
      expect(performance.now() - began).to.be.lessThan(1000);
    } finally {
      Object.defineProperty(IDBFactory.prototype, 'open', real);
    }
  });

  it('does not believe what storage gives back without a check', async () => {
    const { openCache } = await import('../../../packages/elements/src/shared/storage.js');
    const name = `checked-${Date.now()}`;
    await openCache(name, (value): value is number => typeof value === 'number').write('a', 1);
    expect(await openCache(name, (value): value is string => typeof value === 'string').read('a')).to.equal(null);
  });
});

describe('rillage-station: races, order, leaving', () => {
  let network: ReturnType<typeof answering> | undefined;
  afterEach(() => {
    network?.stop();
    clear();
  });

  it('drops the answer to an address that is no longer asked for', async () => {
    const station = await fixture();
    const other = { ...station, id: 'second', name: 'Second Invented Brook' };
    const answers: Record<string, (response: Response) => void> = {};
    network = answering(({ url }) => new Promise((done) => (answers[url.includes('second') ? 'second' : 'first'] = done)));
    const element = await mount('rillage-station', { src: address() });
    await until(() => answers['first'], 'first asked');
    element.src = `./second-${Date.now()}.json`;
    await until(() => answers['second'], 'second asked');
    expect(network.asked[0]!.signal.aborted).to.equal(true);
    answers['second']!(json(other));
    await until(() => element.view.station, 'second shown');
    answers['first']!(json(station));
    await pause(50);
    expect(element.view.station!.id).to.equal('second');
  });

  it('aborts when it leaves the page, and asks again when it comes back', async () => {
    network = answering(() => new Promise(() => {}));
    const element = await mount('rillage-station', { src: address() });
    await until(() => network!.asked.length === 1, 'asked');
    element.remove();
    expect(network.asked[0]!.signal.aborted).to.equal(true);
    stage().append(element);
    await until(() => network!.asked.length === 2, 'asked again');
  });

  it('reads a JSON child, and a changed one', async () => {
    const station = await fixture();
    const script = Object.assign(document.createElement('script'), { type: 'application/json', textContent: JSON.stringify(station) });
    const element = document.createElement('rillage-station');
    element.append(script);
    stage().append(element);
    await until(() => element.view.station, 'read');
    script.textContent = JSON.stringify(station.reading);
    await until(() => element.view.reading && !element.view.station, 'read again');
    script.textContent = '{';
    await until(() => element.state === 'failed', 'failed');
  });

  it('takes a station’s public excerpt, from an address as from a property', async () => {
    const { members: _members, seal, ...content } = await fixture();
    const excerpt = { ...content, kind: 'rillage-excerpt' as const, stationSeal: seal, seal };
    network = answering(() => json(excerpt));
    const element = await mount('rillage-station', { src: address(), staleAfter: 'never' });
    await until(() => element.state === 'ready', 'ready');
    const plot = await mount('rillage-age-plot', {}, element);
    expect(shown(plot)).to.contain('Half of the water is older than');
    const given = await mount('rillage-station', { station: excerpt, staleAfter: 'never' });
    expect(given.view.station!.kind).to.equal('rillage-excerpt');
    network.stop();
    network = answering(() => json({ ...excerpt, distribution: { ...excerpt.distribution, preRecordShare: 3 } }));
    const damaged = await mount('rillage-station', { src: address() });
    await until(() => damaged.state === 'failed', 'failed');
    await settled(damaged);
    expect(shown(damaged)).to.contain('distribution.preRecordShare');
  });

  it('takes a property before an address', async () => {
    const station = await fixture();
    network = answering(() => json({ ...station, id: 'from-address' }));
    const element = await mount('rillage-station', { station, src: address() });
    await pause(50);
    expect(network.asked.length).to.equal(0);
    expect(element.view.station!.id).to.equal(station.id);
  });

  it('answers an element inside, whichever is upgraded first, also through a shadow root', async () => {
    const station = await fixture();
    const { defineAll } = await import('../../../packages/elements/src/index.js');
    const prefix = `late${Date.now()}`;
    const outer = document.createElement(`${prefix}-station`) as HTMLElement & { station: unknown; view: StationView };
    outer.station = station;
    const host = document.createElement('div');
    const inner = document.createElement('rillage-reading');
    host.attachShadow({ mode: 'closed' }).append(inner);
    outer.append(host);
    stage().append(outer);
    await settled(inner);
    expect(inner.shadowRoot!.querySelector('slot')).not.to.equal(null);
    defineAll({ prefix });
    await until(() => shown(inner).includes('litres'), 'told by the later station');
  });

  it('forgets an element that leaves, and tells one that moves in', async () => {
    const station = await fixture();
    const one = await mount('rillage-station', { station });
    const two = await mount('rillage-station', { station: { ...station.reading, station: { id: 'b', name: 'Second Invented Brook' } } });
    const reading = await mount('rillage-reading', {}, one);
    expect(shown(reading)).to.contain(station.name);
    two.append(reading);
    await settled(reading);
    expect(shown(reading)).to.contain('Second Invented Brook');
    reading.remove();
    stage().append(reading);
    await settled(reading);
    expect(reading.shadowRoot!.querySelector('slot')).not.to.equal(null);
  });

  it('leaves no listener behind after fifty times in and out', async () => {
    const counts = new Map<string, number>();
    const watch = (target: EventTarget): (() => void) => {
      const { addEventListener: add, removeEventListener: remove } = target;
      target.addEventListener = (type: string, ...rest: unknown[]) => {
        counts.set(type, (counts.get(type) ?? 0) + 1);
        return Reflect.apply(add, target, [type, ...rest]);
      };
      target.removeEventListener = (type: string, ...rest: unknown[]) => {
        counts.set(type, (counts.get(type) ?? 0) - 1);
        return Reflect.apply(remove, target, [type, ...rest]);
      };
      return () => {
        target.addEventListener = add;
        target.removeEventListener = remove;
      };
    };
    const stops = [watch(window), watch(document)];
    try {
      const station = await mount('rillage-station', { station: await fixture() });
      await mount('rillage-reading', {}, station);
      await mount('rillage-age-plot', {}, station);
      station.remove();
      for (let turn = 0; turn < 50; turn++) {
        stage().append(station);
        station.remove();
      }
      // Taking off what was never put on (the page had been parsed) counts below nothing and leaks nothing.
      const left = [...counts].filter(([, count]) => count > 0);
      expect(left).to.deep.equal([]);
      expect(counts.get('online')).to.equal(0);
    } finally {
      stops.forEach((stop) => stop());
    }
  });

  it('fires a change event with what it hands over, and not without a change', async () => {
    const seen: StationView[] = [];
    const element = document.createElement('rillage-station');
    element.addEventListener('rillage-station-change', (event) => seen.push(event.detail));
    element.station = await fixture();
    stage().append(element);
    await settled(element);
    element.requestUpdate();
    await settled(element);
    expect(seen.length).to.equal(1);
    expect(seen[0]!.reading!.of).to.equal('discharge');
  });
});
