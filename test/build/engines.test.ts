import { chmodSync, existsSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { ensureEngine, enginesWanted, findEngine } from '../browser/config/find.mjs';

/** A machine on whose PATH there is this one folder. */
let folder: string;
beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'rillage-path-'));
  vi.stubEnv('PATH', folder);
  vi.stubEnv('CHROME_PATH', undefined);
});
afterEach(() => {
  vi.unstubAllEnvs();
  vi.restoreAllMocks();
  rmSync(folder, { recursive: true });
});

function program(name: string, script: string): string {
  const path = join(folder, name);
  writeFileSync(path, `#!/bin/sh\n${script}\n`);
  chmodSync(path, 0o755);
  return path;
}

describe('findEngine', () => {
  it('takes the first known name on the PATH', () => {
    expect(findEngine('chromium')).toBeUndefined();
    const stable = program('google-chrome-stable', 'true');
    expect(findEngine('chromium')).toBe(stable);
    const chromium = program('chromium', 'true');
    expect(findEngine('chromium')).toBe(chromium);
  });

  it('takes CHROME_PATH before all, if there is such a file', () => {
    program('chromium', 'true');
    const own = program('my-browser', 'true');
    vi.stubEnv('CHROME_PATH', own);
    expect(findEngine('chromium')).toBe(own);
    vi.stubEnv('CHROME_PATH', `${own}-absent`);
    expect(findEngine('chromium')).toBeUndefined();
  });
});

describe('ensureEngine', () => {
  it('says exactly what to install where it cannot', () => {
    expect(() => ensureEngine('chromium')).toThrow(/apt-get install -y --no-install-recommends chromium.*set CHROME_PATH/);
  });

  it("installs Debian's where root has apt-get, and takes it", () => {
    vi.spyOn(process, 'getuid').mockReturnValue(0);
    vi.spyOn(console, 'log').mockReturnValue();
    for (const tool of ['sh', 'cp', 'chmod'])
      symlinkSync(
        ['/bin', '/usr/bin'].map((each) => join(each, tool)).find((each) => existsSync(each))!,
        join(folder, tool),
      );
    program('apt-get', `echo "$@" >> ${folder}/asked\nif [ "$1" = install ]; then cp ${folder}/apt-get ${folder}/chromium; fi`);
    expect(ensureEngine('chromium')).toBe(join(folder, 'chromium'));
    expect(readFileSync(join(folder, 'asked'), 'utf8').split('\n')).toEqual(['update', 'install -y --no-install-recommends chromium', '']);
  });

  it('installs nothing for a person who is not root', () => {
    vi.spyOn(process, 'getuid').mockReturnValue(1000);
    program('apt-get', `echo asked > ${folder}/asked`);
    expect(() => ensureEngine('chromium')).toThrow('was not found');
    expect(existsSync(join(folder, 'asked'))).toBe(false);
  });
});

describe('enginesWanted', () => {
  it('reads BROWSERS, and refuses an unknown name', () => {
    vi.stubEnv('BROWSERS', 'chromium, webkit');
    expect(enginesWanted()).toEqual(['chromium', 'webkit']);
    vi.stubEnv('BROWSERS', 'chromium,lynx');
    expect(() => enginesWanted()).toThrow("'lynx'");
    vi.stubEnv('BROWSERS', undefined);
    expect(enginesWanted()).toEqual(['chromium']);
  });
});
