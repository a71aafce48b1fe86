/** One problem with an input: data first, words made from it by {@link describeIssue}. */
export interface Issue {
  /** Stable, kebab-case; the same word the tests assert on. */
  code: string;
  /** Where in the input: `outflows.discharge[412]`, `selection.discharge.scale`, a column name. */
  path?: string;
  /** Step index in a forcing, from 0. */
  step?: number;
  /** Row in a text source, from 1, as an editor counts lines. */
  row?: number;
  /** What would have been right. */
  expected?: string;
  /** What was there. Shortened to 120 characters. */
  received?: string;
  /** What to do about it. */
  hint?: string;
}

/**
 * The only error the SDK throws on purpose. `code`, `path`, `step` and `row` are those of the first issue; `issues` holds all of them.
 * An aborted call throws it with code `aborted`.
 */
export class RillageError extends Error {
  override readonly name = 'RillageError';
  readonly code: string;
  readonly path: string | undefined;
  readonly step: number | undefined;
  readonly row: number | undefined;
  readonly expected: string | undefined;
  readonly received: string | undefined;
  readonly hint: string | undefined;
  readonly issues: readonly Issue[];

  constructor(issues: Issue | readonly Issue[], options?: { cause?: unknown }) {
    const all: readonly Issue[] = Array.isArray(issues) ? (issues as readonly Issue[]) : [issues as Issue];
    const first: Issue = all[0] ?? { code: 'unknown' };
    super(describeIssues(all), options as ErrorOptions);
    this.code = first.code;
    this.path = first.path;
    this.step = first.step;
    this.row = first.row;
    this.expected = first.expected;
    this.received = first.received;
    this.hint = first.hint;
    this.issues = all;
  }
}

const SHOWN_AT_MOST = 5;

/** The one formatter of messages: place, what was expected, what was received, what to do. */
export function describeIssue(issue: Issue): string {
  const place = [
    issue.path,
    issue.step === undefined ? undefined : `step ${issue.step}`,
    issue.row === undefined ? undefined : `row ${issue.row}`,
  ]
    .filter((part) => part !== undefined)
    .join(', ');
  const parts = [`[${issue.code}]`];
  if (place) parts.push(`${place}:`);
  if (issue.expected !== undefined) parts.push(`expected ${issue.expected}${issue.received === undefined ? '.' : ','}`);
  if (issue.received !== undefined) parts.push(`received ${shorten(issue.received)}.`);
  if (issue.hint !== undefined) parts.push(issue.hint);
  return parts.join(' ');
}

function describeIssues(issues: readonly Issue[]): string {
  const shown = issues.slice(0, SHOWN_AT_MOST).map(describeIssue);
  const rest = issues.length - shown.length;
  if (rest > 0) shown.push(`… and ${rest} more (see issues).`);
  return shown.join('\n');
}

/** Text from outside, made safe to put into one line of a message: no control or direction characters, 120 characters at most. */
export function shorten(value: unknown, limit = 120): string {
  let text: string;
  try {
    text = typeof value === 'string' ? value : typeof value === 'number' ? String(value) : (JSON.stringify(value) ?? String(value));
  } catch {
    text = String(value);
  }
  // eslint-disable-next-line no-control-regex
  const clean = text.replace(/[\u0000-\u001f\u007f-\u009f\u200e\u200f\u202a-\u202e\u2066-\u2069]/g, ' ');
  return clean.length > limit ? `${clean.slice(0, limit - 1)}…` : clean;
}

/** Throws one batch if there is anything in it. */
export function throwIfAny(issues: readonly Issue[]): void {
  if (issues.length > 0) throw new RillageError(issues);
}

/** Throws `aborted` if the caller's signal has been raised. */
export function throwIfAborted(signal: AbortSignal | undefined): void {
  if (signal?.aborted)
    throw new RillageError({ code: 'aborted', hint: 'The caller ended this call through its signal.' }, { cause: signal.reason });
}
