import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

/**
 * The plain every-age solver in C (everyAge.c) on the same record: seconds of CPU time (best of three), and its last day's shares, median
 * and concentration. null where no C compiler is found.
 */
export function runYardstick(forcing, catchment) {
  const folder = mkdtempSync(join(tmpdir(), 'rillage-bench-'));
  try {
    const program = join(folder, 'everyAge');
    execFileSync('cc', ['-O3', '-o', program, fileURLToPath(new URL('everyAge.c', import.meta.url)), '-lm'], { stdio: 'ignore' });
    const rows = [`${forcing.inflow.length} ${catchment.initialStorage} ${catchment.tracers.d18O.preRecord}`];
    for (let k = 0; k < forcing.inflow.length; k++) {
      rows.push(
        `${forcing.inflow[k]} ${forcing.outflows.discharge[k]} ${forcing.outflows.evapotranspiration[k]} ${forcing.inflowConcentration.d18O[k]}`,
      );
    }
    const [seconds, ...rest] = execFileSync(program, { input: rows.join('\n') })
      .toString()
      .trim()
      .split(' ')
      .map(Number);
    return { seconds, shares: rest.slice(0, 4), median: rest[4], concentration: rest[5] };
  } catch {
    return null;
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}
