import { effect } from '@preact/signals';
import { Cancelled, type Job } from '../engine/contract.ts';
import type { Engine } from '../engine/engine.client.ts';
import { withWholeView } from '../engine/partialView.ts';
import type { Setup } from '../engine/setup.ts';
import { keepPhoto } from './keep.ts';
import {
  begin,
  DEFAULT_SETUP,
  dropResult,
  failure,
  image,
  keepResult,
  mapView,
  preview,
  probe,
  probeAt,
  progress,
  result,
  setup,
  step,
  wipe,
} from './state.ts';
import { lensFacts } from './viewState.ts';

/** What runs between the screens and the engine: open, measure, probe, cancel. */
let engine: Engine | null = null;
let running: Job<unknown> | null = null;
/** Progress is shown only for what takes longer than this, ms. */
const SHOW_AFTER_MS = 300;

/** The engine, loaded when first needed so that the first screen is light. Tests may pass their own. */
export async function theEngine(): Promise<Engine> {
  engine ??= (await import('../engine/createEngine.client.ts')).createEngine();
  return engine;
}

export function useEngine(own: Engine): void {
  engine = own;
}

/** Runs a job with progress and a way to cancel; failures become a sentence. */
async function run<T>(
  start: (onProgress: (share: number, step: string) => void) => Job<T>,
  first: string,
): Promise<T | null> {
  failure.value = null;
  let latest = { share: 0, step: first };
  const show = setTimeout(() => {
    progress.value = latest;
  }, SHOW_AFTER_MS);
  try {
    const job = start((share, words) => {
      latest = { share, step: words };
      if (progress.value) progress.value = latest;
    });
    running = job;
    return await job.promise;
  } catch (error) {
    if (!(error instanceof Cancelled)) failure.value = error instanceof Error ? error.message : String(error);
    return null;
  } finally {
    clearTimeout(show);
    running = null;
    progress.value = null;
  }
}

export function cancel(): void {
  running?.cancel();
}

/** Opens a photo; on success the work begins at the film step with `first` as its set-up. */
export async function openPhoto(blob: Blob, name: string, first?: Setup): Promise<boolean> {
  const current = await theEngine();
  const opened = await run((onProgress) => current.openPhoto(blob, name, onProgress), 'opening the photo');
  if (!opened) return false;
  let bitmap: ImageBitmap;
  try {
    bitmap = await previewOf(blob);
  } catch {
    failure.value = 'This browser cannot show the photo. Open a JPEG or PNG copy of it.';
    return false;
  }
  image.value?.bitmap.close();
  image.value = { blob, name, bitmap, opened };
  probeAt.value = null;
  begin(first ?? { ...DEFAULT_SETUP, film: setup.value.film });
  step.value = first?.references ? 'map' : 'film';
  wipe.value = 0;
  mapView.value = 'thickness';
  void keepPhoto(blob, name);
  return true;
}

/** A picture for the stage, at most about 4 megapixels: enough for every screen, light on memory. */
async function previewOf(blob: Blob): Promise<ImageBitmap> {
  const whole = await createImageBitmap(blob);
  const share = Math.sqrt(4_000_000 / (whole.width * whole.height));
  if (share >= 1) return whole;
  const small = await createImageBitmap(whole, {
    resizeWidth: Math.round(whole.width * share),
    resizeHeight: Math.round(whole.height * share),
    resizeQuality: 'high',
  });
  whole.close();
  return small;
}

/** Measures the open photo with the present set-up. */
export async function measure(): Promise<void> {
  if (!image.value) return;
  const current = await theEngine();
  dropResult();
  probe.value = null;
  const wanted = setup.value;
  const done = await run(
    (onProgress) => current.estimate(withWholeView(wanted, lensFacts()), onProgress),
    'starting',
  );
  if (!done) return;
  keepResult(done, wanted);
  if (preview.value) void askPreview();
  if (probeAt.value) await readAt(probeAt.value);
}

let isAsking = false;

/**
 * Fetches a coarse map for the marks as they are, and again where they changed meanwhile. On the map's own step the full
 * map follows by itself.
 */
async function askPreview(): Promise<void> {
  if (isAsking) return;
  isAsking = true;
  try {
    for (let asked: Setup | null = null; asked !== setup.value && preview.value; ) {
      asked = setup.value;
      const map = await (await theEngine()).preview(withWholeView(asked, lensFacts()));
      if (asked === setup.value && preview.value) preview.value = map;
    }
  } catch {
    // The worker was ended by a cancel: there is nothing to look at until the next measurement.
    preview.value = null;
  } finally {
    isAsking = false;
  }
  if (step.value === 'map' && image.value && !result.value && !running) void measure();
}

/** While this runs, every change of pins, trend or brush after a measurement is seen on a coarse map at once. */
export function followMarks(): () => void {
  return effect(() => {
    if (setup.value && preview.peek() && !result.peek()) void askPreview();
  });
}

/** Reads one place of a measured photo. */
export async function readAt(at: readonly [number, number]): Promise<void> {
  probeAt.value = at;
  if (!result.value) return;
  const current = await theEngine();
  probe.value = await current.probe(at[0], at[1]);
}

/** Back to the start. The photo and its marks stay on the device: the start offers to go on. */
export function closePhoto(): void {
  cancel();
  image.value?.bitmap.close();
  image.value = null;
  dropResult();
  preview.value = null;
  probe.value = null;
  probeAt.value = null;
  failure.value = null;
}
