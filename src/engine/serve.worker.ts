import type { AnswerMessage, CallMessage, Methods } from './protocol.ts';

declare const self: DedicatedWorkerGlobalScope;

/**
 * Answers the page's calls with the methods given. Array buffers named by `transferOf` are handed over, not copied.
 */
export function serve<M>(
  methods: Methods<M>,
  transferOf: (value: unknown) => Transferable[] = () => [],
): void {
  const table = methods as unknown as Record<
    string,
    (argument: unknown, onProgress: (share: number, step: string) => void) => unknown
  >;
  const post = (message: AnswerMessage, transfer: Transferable[] = []) => self.postMessage(message, transfer);
  self.onmessage = async ({ data }: MessageEvent<CallMessage>) => {
    const { id, method, argument } = data;
    try {
      const run = table[method];
      if (!run) throw new Error(`This worker has no method ${method}.`);
      const value = await run(argument, (share, step) => post({ id, kind: 'progress', share, step }));
      post({ id, kind: 'done', value }, transferOf(value));
    } catch (error) {
      const failure = error instanceof Error ? error : new Error(String(error));
      post({ id, kind: 'failed', name: failure.name, message: failure.message });
    }
  };
}

/** Every array buffer in a plain value, once. */
export function buffersIn(value: unknown): Transferable[] {
  const found = new Set<ArrayBuffer>();
  const visit = (part: unknown) => {
    if (ArrayBuffer.isView(part)) {
      if (part.buffer instanceof ArrayBuffer) found.add(part.buffer);
    } else if (Array.isArray(part)) part.forEach(visit);
    else if (part && typeof part === 'object' && Object.getPrototypeOf(part) === Object.prototype) {
      Object.values(part).forEach(visit);
    }
  };
  visit(value);
  return [...found];
}
