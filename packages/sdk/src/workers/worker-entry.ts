/** The file a worker runs, in a browser, Deno and Bun as a module Worker and in Node as a worker thread. */
import { packError, type Reply, type Request } from './messages.js';
import { runTask } from './tasks.js';
import './allTasks.js';

interface WorkerScope {
  postMessage(message: unknown): void;
  onmessage: ((event: { data: unknown }) => void) | null;
}

function serve(post: (reply: Reply) => void): (data: unknown) => void {
  return (data) => {
    const { id, task, payload } = data as Request;
    try {
      const result = runTask(task, payload, (done) => post({ id, done }));
      post({ id, result });
    } catch (error) {
      post(packError(id, error));
    }
  };
}

async function start(): Promise<void> {
  const scope = globalThis as unknown as WorkerScope;
  if (typeof scope.postMessage === 'function') {
    const post = (reply: Reply): void => scope.postMessage(reply);
    const handle = serve(post);
    scope.onmessage = (event) => handle(event.data);
    post({ ready: true });
    return;
  }
  const { parentPort } = await import('node:worker_threads');
  if (parentPort === null) return;
  const post = (reply: Reply): void => parentPort.postMessage(reply);
  parentPort.on('message', serve(post));
  post({ ready: true });
}

void start();
