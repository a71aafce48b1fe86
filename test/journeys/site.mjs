import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { at } from '../../demo-site/tools/paths.mjs';

/** The site as the newcomer's command serves it, on a free port. @returns `address`, what was `printed` before it, and `stop()` */
export async function startSite() {
  const child = spawn(process.execPath, [at('demo-site/start.mjs')], {
    cwd: at('.'),
    env: { ...process.env, PORT: '0' },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const stop = async () => {
    child.kill('SIGTERM');
    if (child.exitCode === null && child.signalCode === null) await once(child, 'exit');
  };
  try {
    return { ...(await addressPrintedBy(child)), stop };
  } catch (reason) {
    await stop();
    throw reason;
  }
}

/** The address that the command prints, within two minutes: it may have to build first. */
function addressPrintedBy(child) {
  return new Promise((settle, fail) => {
    let printed = '';
    const timer = setTimeout(() => fail(new Error(`no address within two minutes:\n${printed}`)), 120_000);
    const done = (finish) => {
      clearTimeout(timer);
      finish();
    };
    child.stdout.on('data', (part) => {
      printed += part;
      const address = /http:\/\/localhost:\d+\//.exec(printed)?.[0];
      if (address) done(() => settle({ address, printed }));
    });
    child.once('exit', (status) => done(() => fail(new Error(`it ended with status ${status}:\n${printed}`))));
  });
}
