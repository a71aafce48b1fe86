/**
 * The morning job as a process that kills itself: `node|deno dying.mjs N STATION ROWS READING` dies before its N-th act on files, or, where that
 * act is a write, half way through it (N.5). Prints the acts when it lives.
 */
import { runMorning } from '../../../demo-site/service/morning.mjs';

const inDeno = 'Deno' in globalThis;
const [dieAt, station, rows, reading] = inDeno ? Deno.args : process.argv.slice(2);
const files = inDeno
  ? (await import('../../../demo-site/service/deno.mjs')).denoFiles
  : (await import('../../../demo-site/service/node.mjs')).nodeFiles;

let acts = 0;
const names = [];
const mortal = Object.fromEntries(
  Object.entries(files).map(([name, act]) => [
    name,
    async (...given) => {
      acts += 1;
      names.push(name);
      if (acts === Number(dieAt)) die();
      if (name === 'writeSynced' && acts + 0.5 === Number(dieAt)) {
        await act(given[0], given[1].slice(0, given[1].length / 2));
        die();
      }
      return act(...given);
    },
  ]),
);
await runMorning(mortal, { station, rows, reading });
console.log(`acts ${names.join(' ')}`);

function die() {
  if (inDeno) Deno.kill(Deno.pid, 'SIGKILL');
  else process.kill(process.pid, 'SIGKILL');
}
