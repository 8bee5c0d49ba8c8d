import type { Job, OnProgress } from './contract.ts';
import { Cancelled } from './contract.ts';
import { type AnswerMessage, type CallMessage, WorkerFailure } from './protocol.ts';

/** A worker seen from the page: typed calls with progress; ending it cancels whatever runs. */
export interface Caller<M> {
  readonly call: <K extends keyof M & string>(
    method: K,
    argument: M[K] extends { readonly in: infer I } ? I : never,
    options?: { readonly onProgress?: OnProgress | undefined; readonly transfer?: Transferable[] },
  ) => Promise<M[K] extends { readonly out: infer O } ? O : never>;
  /** Ends the worker; running calls reject with `Cancelled`. */
  readonly end: () => void;
}

interface Pending {
  readonly resolve: (value: unknown) => void;
  readonly reject: (error: Error) => void;
  readonly onProgress: OnProgress | undefined;
}

/** Wraps a worker that serves methods `M`. */
export function makeCaller<M>(worker: Worker): Caller<M> {
  const pending = new Map<number, Pending>();
  let next = 1;
  const failAll = (error: Error) => {
    for (const { reject } of pending.values()) reject(error);
    pending.clear();
  };
  worker.onmessage = ({ data }: MessageEvent<AnswerMessage>) => {
    const call = pending.get(data.id);
    if (!call) return;
    if (data.kind === 'progress') {
      call.onProgress?.(data.share, data.step);
      return;
    }
    pending.delete(data.id);
    if (data.kind === 'done') call.resolve(data.value);
    else call.reject(new WorkerFailure(data.name, data.message));
  };
  worker.onerror = (event) =>
    failAll(
      new WorkerFailure('WorkerError', event.message || 'The reading stopped unexpectedly; try again.'),
    );
  return {
    call: (method, argument, options = {}) =>
      new Promise((resolve, reject) => {
        const id = next++;
        pending.set(id, {
          resolve: resolve as (value: unknown) => void,
          reject,
          onProgress: options.onProgress,
        });
        const message: CallMessage = { id, method, argument };
        worker.postMessage(message, options.transfer ?? []);
      }),
    end: () => {
      worker.terminate();
      failAll(new Cancelled('cancelled'));
    },
  };
}

/** A job whose promise comes from `run`; cancelling calls `stop` once. */
export function jobOf<T>(run: () => Promise<T>, stop: () => void): Job<T> {
  let settled = false;
  const promise = run().finally(() => {
    settled = true;
  });
  return {
    promise,
    cancel: () => {
      if (!settled) stop();
    },
  };
}
