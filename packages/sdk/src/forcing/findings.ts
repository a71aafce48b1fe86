import type { Finding } from '../contract.js';
import { RillageError, shorten, type Issue } from '../errors.js';

const ROWS_SHOWN = 20;
const ISSUES_KEPT = 200;

/** What one reading notices: findings that are reported, and problems that end it in one batch. */
export class Notebook {
  readonly findings: Finding[] = [];
  readonly issues: Issue[] = [];
  #issueCount = 0;

  note(finding: Finding): void {
    this.findings.push({
      ...finding,
      ...(finding.rows ? { rows: finding.rows.slice(0, ROWS_SHOWN) } : {}),
      seen: shorten(finding.seen, 400),
    });
  }

  /** The same where there is something to tell. */
  noteRows(rows: readonly number[], finding: Omit<Finding, 'rows' | 'count'>): void {
    if (rows.length > 0) this.note({ ...finding, rows: rows.slice(0, ROWS_SHOWN), count: rows.length });
  }

  /** A problem; collected up to a bound, so that a hopeless file ends soon and in one readable batch. */
  problem(issue: Issue): void {
    this.#issueCount += 1;
    if (this.issues.length < ISSUES_KEPT) this.issues.push(issue);
    if (this.#issueCount > 10 * ISSUES_KEPT) this.stopIfAny();
  }

  /** Runs `work`; what it throws joins the batch. */
  attempt<T>(work: () => T, place: Partial<Issue>, fallback: T): T {
    try {
      return work();
    } catch (error) {
      if (!(error instanceof RillageError)) throw error;
      for (const issue of error.issues) this.problem({ ...issue, ...place });
      return fallback;
    }
  }

  stopIfAny(): void {
    if (this.issues.length > 0) throw new RillageError(this.issues);
  }
}
