import { unpackError, type Reply } from './messages.js';
import { openThread, type Thread, type WorkerSource } from './threads.js';

/** A few workers behind one queue. */
export interface Pool {
  readonly size: number;
  /** Any free worker does it. */
  call(task: string, payload: unknown, onDone?: (done: number) => void): Promise<unknown>;
  /** Every worker does it. */
  broadcast(task: string, payload: unknown): Promise<void>;
  /** Ends the workers at once; calls that wait are rejected. */
  close(): void;
}

interface Job {
  task: string;
  payload: unknown;
  onDone: ((done: number) => void) | undefined;
  resolve(value: unknown): void;
  reject(error: unknown): void;
}

/** Opens up to `size` workers; null where none can be had. */
export async function openPool(size: number, options: { worker?: WorkerSource } = {}): Promise<Pool | null> {
  const opened = await Promise.all(Array.from({ length: Math.max(1, size) }, () => openThread(options.worker)));
  const threads = opened.filter((thread) => thread !== null);
  return threads.length === 0 ? null : new ThreadPool(threads.map((thread) => new Seat(thread)));
}

class ThreadPool implements Pool {
  private readonly waiting: Job[] = [];

  constructor(private readonly seats: Seat[]) {
    for (const seat of seats) seat.whenFree = () => this.next(seat);
  }

  get size(): number {
    return this.seats.length;
  }

  call(task: string, payload: unknown, onDone?: (done: number) => void): Promise<unknown> {
    return new Promise((resolve, reject) => {
      this.waiting.push({ task, payload, onDone, resolve, reject });
      const free = this.seats.find((seat) => seat.isFree);
      if (free !== undefined) this.next(free);
    });
  }

  async broadcast(task: string, payload: unknown): Promise<void> {
    await Promise.all(
      this.seats.map((seat) => new Promise((resolve, reject) => seat.enqueue({ task, payload, onDone: undefined, resolve, reject }))),
    );
  }

  close(): void {
    const closed = new Error('The pool was closed.');
    for (const job of this.waiting.splice(0)) job.reject(closed);
    for (const seat of this.seats) seat.close(closed);
  }

  private next(seat: Seat): void {
    const job = this.waiting.shift();
    if (job !== undefined) seat.enqueue(job);
  }
}

/** One worker with its own jobs, in order. */
class Seat {
  whenFree: () => void = () => undefined;
  private readonly jobs: Job[] = [];
  private id = 0;

  constructor(private readonly thread: Thread) {
    thread.onReply = (reply) => this.take(reply);
    thread.onFailure = (error) => this.close(error);
  }

  get isFree(): boolean {
    return this.jobs.length === 0;
  }

  enqueue(job: Job): void {
    this.jobs.push(job);
    if (this.jobs.length === 1) this.start(job);
  }

  close(reason: unknown): void {
    this.thread.end();
    for (const job of this.jobs.splice(0)) job.reject(reason);
  }

  private start(job: Job): void {
    this.id++;
    this.thread.post({ id: this.id, task: job.task, payload: job.payload });
  }

  private take(reply: Reply): void {
    const job = this.jobs[0];
    if (job === undefined || !('id' in reply) || reply.id !== this.id) return;
    if ('done' in reply) {
      job.onDone?.(reply.done);
      return;
    }
    this.jobs.shift();
    if ('result' in reply) job.resolve(reply.result);
    else job.reject(unpackError(reply));
    const following = this.jobs[0];
    if (following !== undefined) this.start(following);
    else this.whenFree();
  }
}
