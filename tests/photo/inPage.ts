/** Runs in the test page, and in a worker of it: calls the photo modules and hands back what can cross to Node. */
import { decodePhoto } from '../../src/photo/decode.browser.ts';
import { selfTest } from '../../src/photo/selfTest.browser.ts';

export interface Order {
  /** The file. */
  readonly base64: string;
  readonly maxPixels?: number;
  /** Abort when this share of the progress is reached. */
  readonly abortAt?: number;
}

/** Codes as base64, for the protocol carries no typed arrays. */
export type Answer =
  | { readonly error: { readonly name: string; readonly message: string } }
  | {
      readonly error?: undefined;
      readonly width: number;
      readonly height: number;
      readonly channels: number;
      readonly maxCode: number;
      readonly encodingId: string;
      readonly scale: number;
      readonly notices: readonly string[];
      readonly metadata: Record<string, unknown>;
      readonly base64: string;
      readonly steps: readonly (readonly [number, string])[];
    };

async function decode({ base64, maxPixels, abortAt }: Order): Promise<Answer> {
  const bytes = Uint8Array.from(atob(base64), (letter) => letter.charCodeAt(0));
  const steps: [number, string][] = [];
  const controller = new AbortController();
  try {
    const photo = await decodePhoto(new Blob([bytes]), 'photo', {
      ...(maxPixels !== undefined && { maxPixels }),
      signal: controller.signal,
      onProgress: (share, step) => {
        steps.push([share, step]);
        if (abortAt !== undefined && share >= abortAt) controller.abort();
      },
    });
    const { width, height, channels, maxCode, encoding, codes } = photo.pixels;
    return {
      width,
      height,
      channels,
      maxCode,
      encodingId: encoding.id,
      scale: photo.scale,
      notices: photo.notices,
      metadata: { ...photo.metadata },
      base64: toBase64(new Uint8Array(codes.buffer, codes.byteOffset, codes.byteLength)),
      steps,
    };
  } catch (error) {
    const { name, message } = error as Error;
    return { error: { name, message } };
  }
}

function toBase64(bytes: Uint8Array): string {
  let text = '';
  for (let i = 0; i < bytes.length; i += 8192) text += String.fromCharCode(...bytes.subarray(i, i + 8192));
  return btoa(text);
}

function decodeInWorker(order: Order): Promise<Answer> {
  const worker = new Worker(import.meta.url, { type: 'module' });
  return new Promise<Answer>((resolve, reject) => {
    worker.onmessage = ({ data }) => resolve(data);
    worker.onerror = ({ message }) => reject(new Error(message));
    worker.postMessage(order);
  }).finally(() => worker.terminate());
}

/** What a test may call by `page.evaluate`. */
export interface PhotoTests {
  readonly decode: typeof decode;
  readonly decodeInWorker: typeof decode;
  readonly selfTest: typeof selfTest;
}
declare global {
  var photoTests: PhotoTests;
}
globalThis.photoTests = { decode, decodeInWorker, selfTest };

if (typeof document === 'undefined')
  globalThis.onmessage = async ({ data }) => globalThis.postMessage(await decode(data));
