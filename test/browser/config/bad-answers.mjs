import { readFile } from 'node:fs/promises';
import { PassThrough } from 'node:stream';
import { at } from '../../../demo-site/tools/paths.mjs';

/**
 * A server that misbehaves, for tests over a real network: `/answers/HOW/KEY.json`. HOW says what comes; KEY is the test's own, so that each
 * has an address that no other test uses. The good answer is the fixture's station.
 */
export async function badAnswers(context, next) {
  const [, how] = /^\/answers\/([a-z-]+)\//.exec(context.path) ?? [];
  if (!how) return next();
  if (!Object.hasOwn(answers, how)) throw new Error(`no answer is called ${how}`);
  const visit = (visits.get(context.path) ?? 0) + 1;
  visits.set(context.path, visit);
  // A sandboxed frame asks across origins.
  context.set('Access-Control-Allow-Origin', '*');
  context.set('Cache-Control', 'no-store');
  context.type = 'application/json';
  return answers[how](context, await readFile(at('test/fixtures/station.json'), 'utf8'), visit);
}

const visits = new Map();

const answers = {
  good: (context, station) => void (context.body = station),
  page(context) {
    context.body = '<!doctype html><title>Log in</title>';
    context.type = 'text/html';
  },
  'page-as-json': (context) => void (context.body = '<!doctype html><title>Log in</title>'),
  missing(context) {
    context.body = 'not here';
    context.status = 404;
  },
  failing(context) {
    context.body = 'no';
    context.status = 500;
  },
  empty: (context) => void (context.body = ''),
  nothing,
  truncated: (context, station) => void (context.body = station.slice(0, station.length / 2)),
  // The connection breaks off in the middle of what was promised.
  broken(context, station) {
    const body = new PassThrough();
    context.set('Content-Length', String(Buffer.byteLength(station)));
    context.body = body;
    body.write(station.slice(0, 2000));
    setTimeout(() => context.req.socket.destroy(), 100);
  },
  oversized: (context, station) => void (context.body = station + ' '.repeat(6_000_000)),
  // The first visit gets the station and its tag, the next is told that it still holds.
  tagged(context, station) {
    context.set('ETag', '"first"');
    if (context.get('if-none-match') === '"first"') context.status = 304;
    else context.body = station;
  },
  'once-then-nothing': (context, station, visit) => (visit === 1 ? answers.good(context, station) : nothing(context)),
  'once-then-page': (context, station, visit) => answers[visit === 1 ? 'good' : 'page'](context, station),
};

/** As without a network: no answer, the connection closed. */
function nothing(context) {
  context.respond = false;
  context.req.socket.destroy();
}
