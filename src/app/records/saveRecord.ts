import { signal } from '@preact/signals';
import { finished, newObservation } from '../../engine/newObservation.ts';
import type { Observation, ViewpointKind } from '../../record/observation.ts';
import { recordResult } from '../../record/recordResult.ts';
import { polariser, tally, tallyFault, viewpoint, workOutAmount } from '../amountState.ts';
import { failure, image, onWater, progress, result, setup } from '../state.ts';
import { filmName } from '../words/names.ts';
import { shown, theDesk, theStore, trouble } from './desk.ts';
import { patched } from './fields/patched.ts';
import { rememberedObserver } from './observerMemory.ts';
import { thumbnailOf } from './thumbnail.ts';

/** Version of the app, from package.json at build time. */
declare const __APP_VERSION__: string;

/** The record that the open photo belongs to: saving it again renews that one. */
export const workedOn = signal<{ readonly id: string; readonly sha256: string } | null>(null);

export const MADE_WITH = { app: __APP_VERSION__, model: __APP_VERSION__ } as const;

/**
 * Keeps the measured photo as a record and shows it. Where the device has no room the record is shown all the same, with the
 * way to take it along.
 */
export async function saveRecord(): Promise<void> {
  if (isSaving) return;
  isSaving = true;
  failure.value = null;
  const show = setTimeout(() => {
    progress.value = { share: 0, step: 'saving the record' };
  }, SHOW_AFTER_MS);
  try {
    await save();
  } catch (error) {
    failure.value = error instanceof Error ? error.message : String(error);
  } finally {
    clearTimeout(show);
    progress.value = null;
    isSaving = false;
  }
}

let isSaving = false;
/** Progress is shown only for what takes longer than this, ms. */
const SHOW_AFTER_MS = 300;

async function save(): Promise<void> {
  const open = image.value;
  const done = result.value;
  if (!open || !done) return;
  const isOnWater = onWater(setup.value.film);
  // Anew, so that the record holds what is true of this map; a view that contradicts itself is said in its own step.
  if (isOnWater) await workOutAmount();
  const amount = isOnWater && tallyFault.value === null ? tally.value : null;
  const { metadata, width, height } = open.opened;
  const before = workedOn.value?.sha256 === metadata.sha256 ? await recordOf(workedOn.value.id) : null;
  const nowUtc = new Date().toISOString();
  const remembered = rememberedObserver();
  const fresh = newObservation({
    id: before?.id ?? crypto.randomUUID(),
    nowUtc,
    madeWith: MADE_WITH,
    title: titleOf(metadata.fileName),
    from: isOnWater ? seenFrom(remembered?.from) : 'bench',
    ...(remembered && { observer: remembered.observer }),
    photo: { metadata: plain(metadata), measuredWidth: width, measuredHeight: height },
    setup: plain(setup.value),
    result: recordResult({
      summary: plain(done.summary),
      area: amount?.area ?? null,
      byThickness: amount?.byThickness ?? null,
      byCode: amount?.byCode ?? null,
      comparison: amount?.comparison ?? null,
      notices: amount?.notices ?? [],
    }),
    ...(isOnWater && polariser.value !== 'unknown' && { conditions: { polariser: polariser.value } }),
  });
  const observation = before ? finished(renewed(before, fresh)) : fresh;
  const thumbnail = await thumbnailOf(open.bitmap);
  const kept = await theDesk().keep({ observation, original: open.blob, thumbnail, map: done.map });
  // Asked for once there is something to lose; only the page may ask.
  await navigator.storage?.persist?.().catch(() => false);
  workedOn.value = { id: observation.id, sha256: metadata.sha256 };
  shown.value = kept;
  trouble.value = null;
  location.hash = `#/records/${observation.id}`;
}

/**
 * The new reading, with the words that were given to the record before. Where both the set-up and the record have a word
 * for a thing, the set-up's counts only if it has changed since.
 */
function renewed(before: Observation, fresh: Observation): Observation {
  const [old, now] = [before.setup, fresh.setup];
  const isSame = (key: 'position' | 'windMS' | 'headingDeg') =>
    JSON.stringify(old?.[key]) === JSON.stringify(now?.[key]);
  const { headingDeg, headingReference } = before.viewpoint;
  return {
    ...fresh,
    title: before.title,
    createdUtc: before.createdUtc,
    observer: before.observer,
    time: before.time,
    position: isSame('position') ? before.position : fresh.position,
    ...(before.placeName !== undefined && { placeName: before.placeName }),
    viewpoint: patched(
      {
        ...fresh.viewpoint,
        from: viewpoint.value === 'unknown' ? before.viewpoint.from : fresh.viewpoint.from,
      },
      isSame('headingDeg') ? { headingDeg, headingReference } : {},
    ),
    conditions: patched(
      { ...before.conditions, ...fresh.conditions },
      isSame('windMS') ? { windMS: before.conditions.windMS } : {},
    ),
    substance: before.substance,
    slickByEye: before.slickByEye,
    lookAlikes: before.lookAlikes,
    toldTo: before.toldTo,
    remarks: before.remarks,
  };
}

async function recordOf(id: string): Promise<Observation | null> {
  if (shown.value?.observation.id === id) return shown.value.observation;
  const list = await theStore()
    .then((store) => store.list())
    .catch(() => []);
  return list.find((entry) => entry.id === id)?.observation ?? null;
}

/** What was said of this photo, else what was said last time. */
function seenFrom(last: ViewpointKind | undefined): ViewpointKind {
  return viewpoint.value !== 'unknown' ? viewpoint.value : last && last !== 'bench' ? last : 'unknown';
}

function titleOf(fileName: string): string {
  return `${filmName(setup.value.film)}, ${fileName.replace(/\.[^.]*$/, '')}`;
}

/** A copy without what JSON has no word for. */
function plain<T>(value: T): T {
  return JSON.parse(JSON.stringify(value)) as T;
}
