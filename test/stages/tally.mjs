import { spawn } from 'node:child_process';
import { at } from '../../demo-site/tools/paths.mjs';

/** Counts checks of one stage; a failure is printed at once and kept for the summary. */
export class Tally {
  passed = 0;
  failures = [];

  get failed() {
    return this.failures.length;
  }

  /** One check: it fails where `body` throws, rejects or returns false. */
  async check(title, body) {
    try {
      if ((await body()) === false) throw new Error('failed; see above');
      this.passed += 1;
    } catch (reason) {
      this.fail(title, reason instanceof Error ? reason.message : String(reason));
    }
  }

  fail(title, because) {
    this.failures.push(title);
    console.log(`  FAILED ${title}\n    ${because.split('\n').join('\n    ')}`);
  }

  /** Adds what another runner counted. */
  add({ passed, failed }, title) {
    this.passed += passed;
    for (let index = 0; index < failed; index += 1) this.failures.push(title);
  }
}

/** In a log, colours are noise. */
const plain = process.stdout.isTTY ? {} : { NO_COLOR: '1', FORCE_COLOR: '0' };

/**
 * Runs a program to its end, in the repository unless told otherwise.
 * @param quiet  keep the output back unless it fails
 * @returns status (1 where it was ended by a signal) and everything it printed
 */
export function run(command, args, { cwd = at('.'), env = {}, quiet = true, timeoutMs = 600_000 } = {}) {
  return new Promise((settle) => {
    const child = spawn(command, args, {
      cwd,
      env: { ...process.env, ...plain, ...env },
      stdio: ['ignore', 'pipe', 'pipe'],
      timeout: timeoutMs,
    });
    let output = '';
    let stdout = '';
    const take = (stream, isOut) =>
      stream.on('data', (part) => {
        output += part;
        if (isOut) stdout += part;
        if (!quiet) process.stdout.write(part);
      });
    take(child.stdout, true);
    take(child.stderr, false);
    child.on('error', (reason) => settle({ status: 1, output: String(reason), stdout }));
    child.on('close', (status) => settle({ status: status ?? 1, output, stdout }));
  });
}

/** Runs a script with this Node. */
export const runNode = (script, args, options) => run(process.execPath, [script, ...args], options);

/** Throws with the program's output where it failed. */
export function expectSuccess({ status, output, stdout }) {
  if (status !== 0) throw new Error(`ended with status ${status}\n${output.trim()}`);
  return stdout;
}
