import { mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { setTimeout as wait } from 'node:timers/promises';
import { at } from './paths.mjs';

const path = at('.cache/build.lock');

/** Runs `work` while no other build of this folder runs. A lock whose process has ended is taken over. */
export async function alone(work) {
  mkdirSync(at('.cache'), { recursive: true });
  while (!take()) await wait(200);
  try {
    return await work();
  } finally {
    rmSync(path, { force: true });
  }
}

function take() {
  try {
    writeFileSync(path, String(process.pid), { flag: 'wx' });
    return true;
  } catch {
    if (!holderLives()) rmSync(path, { force: true });
    return false;
  }
}

function holderLives() {
  try {
    const holder = Number(readFileSync(path, 'utf8'));
    // Empty while its holder is between making and writing it.
    return holder === 0 || process.kill(holder, 0);
  } catch {
    return false;
  }
}
