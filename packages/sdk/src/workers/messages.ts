import { RillageError, type Issue } from '../errors.js';

export interface Request {
  id: number;
  task: string;
  payload: unknown;
}

export type Reply =
  | { ready: true }
  | { id: number; done: number }
  | { id: number; result: unknown }
  | { id: number; issues: Issue[] | null; message: string };

/** An error as plain data; `issues` is null for anything but a RillageError. */
export function packError(id: number, error: unknown): Reply {
  const issues = error instanceof RillageError ? [...error.issues] : null;
  return { id, issues, message: error instanceof Error ? error.message : String(error) };
}

export function unpackError(reply: { issues: Issue[] | null; message: string }): Error {
  return reply.issues !== null ? new RillageError(reply.issues) : new Error(reply.message);
}
