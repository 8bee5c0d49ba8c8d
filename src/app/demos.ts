import type { Setup } from '../engine/setup.ts';

/** A demo photo with its set-up, from the app's own files. */
export async function parseDemo(id: string): Promise<{ readonly blob: Blob; readonly setup: Setup }> {
  const [photo, text] = await Promise.all([fetch(`./demo/${id}.jpg`), fetch(`./demo/${id}.setup.json`)]);
  if (!photo.ok || !text.ok)
    throw new Error('The demo photo is not on this device yet; connect once and try again.');
  return { blob: await photo.blob(), setup: (await text.json()) as Setup };
}
