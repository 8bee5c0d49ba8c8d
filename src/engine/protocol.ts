/**
 * The few words that page and workers exchange. One request has one id; progress may come any number of times, then
 * exactly one `done` or `failed`. Cancelling is the page's business: it ends the worker.
 */

export interface CallMessage {
  readonly id: number;
  readonly method: string;
  readonly argument: unknown;
}

export type AnswerMessage =
  | { readonly id: number; readonly kind: 'progress'; readonly share: number; readonly step: string }
  | { readonly id: number; readonly kind: 'done'; readonly value: unknown }
  | { readonly id: number; readonly kind: 'failed'; readonly name: string; readonly message: string };

/** What a worker can do: each method takes one argument and answers one value. */
export type Methods<M> = {
  readonly [K in keyof M]: M[K] extends { readonly in: infer I; readonly out: infer O }
    ? (argument: I, onProgress: (share: number, step: string) => void) => O | Promise<O>
    : never;
};

/** A failure that came from a worker; `name` is the error's own name there. */
export class WorkerFailure extends Error {
  constructor(name: string, message: string) {
    super(message);
    this.name = name;
  }
}
