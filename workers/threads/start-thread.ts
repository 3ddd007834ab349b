import path from 'node:path';
import { fileURLToPath, pathToFileURL } from 'node:url';
import { Worker, type WorkerOptions } from 'node:worker_threads';

export interface ThreadSource {
  /** The file workers/threads/NAME.thread.ts. */
  readonly name: string;
  /**
   * `(options) => new Worker(new URL('./NAME.thread.ts', import.meta.url), { ...options })`, written out so in the calling
   * file. The bundler follows only this form: with a plain `options` it copies the file unbuilt, and the thread fails.
   */
  readonly bundled: (options: ThreadOptions) => Worker;
}

/** The bundler adds its own to `workerData`, so it must be an object: a bare number or string would arrive as `{}`. */
export interface ThreadOptions extends Omit<WorkerOptions, 'eval' | 'workerData'> {
  readonly workerData: object;
}

/**
 * Starts a thread from a TypeScript file, in the built server and in a process that runs under tsx or vitest. Node's
 * loader refuses a .ts worker there, even with tsx among its arguments, so the thread itself registers tsx first.
 */
export function startThread(source: ThreadSource, options: ThreadOptions): Worker {
  if (process.env['NEXT_RUNTIME'] === 'nodejs') return source.bundled(options);
  const folder = path.dirname(fileURLToPath(import.meta.url));
  const file = pathToFileURL(path.join(folder, `${source.name}.thread.ts`)).href;
  const load = `import('tsx/esm/api').then(({ register }) => { register(); return import(${JSON.stringify(file)}); })`;
  return new Worker(load, { ...options, eval: true });
}

export interface ThreadRun<Message> {
  readonly thread: Worker;
  /** Ends the thread; the run then rejects with the signal's reason. */
  readonly signal: AbortSignal;
  /** Called with every message; return something other than undefined to end the run with it. */
  readonly onMessage: (message: Message) => unknown;
}

/** Follows a thread until a message ends the run, and always ends the thread. An error in the thread rejects. */
export async function followThread<Message, Result>(run: ThreadRun<Message>): Promise<Result> {
  const { thread, signal, onMessage } = run;
  let abort: (() => void) | undefined;
  try {
    return await new Promise<Result>((resolve, reject) => {
      abort = () => reject(signal.reason as Error);
      if (signal.aborted) abort();
      signal.addEventListener('abort', abort, { once: true });
      thread.on('message', (message: Message) => {
        try {
          const result = onMessage(message);
          if (result !== undefined) resolve(result as Result);
        } catch (error) {
          // The handler's error is the run's error: without this it would be nobody's and end the process.
          reject(error as Error);
        }
      });
      thread.once('error', reject);
      thread.once('messageerror', reject);
      thread.once('exit', (code) => reject(new Error(`The thread ended early with code ${code}.`)));
    });
  } finally {
    if (abort) signal.removeEventListener('abort', abort);
    await thread.terminate();
  }
}
