import { computed, signal } from '@preact/signals';
import type { KeptCamera } from '../../engine/keptCamera.ts';
import { change, image, setup } from '../state.ts';

/** The cameras kept on this device, newest first. A few kilobytes each. */
const CAMERAS_KEY = 'tintfathom.cameras';

export const keptCameras = signal<readonly KeptCamera[]>([]);
/** The camera last deleted or replaced, until another is or it is brought back. */
export const forgotten = signal<KeptCamera | null>(null);
/** Why keeping failed, in a sentence. */
export const keepFault = signal<string | null>(null);

let isLoaded = false;

/** Reads the kept cameras once; entries that are none are passed over. */
export async function loadCameras(): Promise<void> {
  if (isLoaded) return;
  isLoaded = true;
  const { readKeptCamera } = await import('../../engine/keptCameraSchema.ts');
  try {
    const list: unknown = JSON.parse(localStorage.getItem(CAMERAS_KEY) ?? '[]');
    if (Array.isArray(list)) keptCameras.value = list.flatMap((entry) => readKeptCamera(entry) ?? []);
  } catch {
    // Storage that is forbidden or broken: nothing kept, and keeping will say so.
  }
}

function store(next: readonly KeptCamera[]): boolean {
  try {
    localStorage.setItem(CAMERAS_KEY, JSON.stringify(next));
    keepFault.value = null;
  } catch {
    keepFault.value = 'This browser lets nothing be kept: free some space, or leave the private window.';
    return false;
  }
  keptCameras.value = next;
  return true;
}

/** Keeps a camera; one of the same name is replaced, and `bringBack` puts it in its place again. */
export async function keepCamera(camera: KeptCamera): Promise<boolean> {
  await loadCameras();
  return put(camera);
}

function put(camera: KeptCamera): boolean {
  const before = keptCameras.value.find(({ name }) => name === camera.name) ?? null;
  if (!store([camera, ...keptCameras.value.filter((other) => other !== before)])) return false;
  forgotten.value = before;
  return true;
}

/** Deletes a camera; `bringBack` undoes it. A photo that was to be read with it goes back to a typical phone. */
export function forgetCamera(camera: KeptCamera): void {
  if (!store(keptCameras.value.filter((other) => other !== camera))) return;
  forgotten.value = camera;
  if (chosenCamera.value?.name === camera.name) chooseCamera(null);
}

export function bringBack(): void {
  if (forgotten.value) put(forgotten.value);
}

/** The kept camera that the open photo is read with. */
export const chosenCamera = computed(() =>
  typeof setup.value.camera === 'object' ? (setup.value.camera.kept ?? null) : null,
);

/** Reads the open photo with a kept camera, or with none. */
export function chooseCamera(camera: KeptCamera | null): void {
  change({ ...setup.value, camera: camera ? { fit: true, kept: camera } : 'phone' });
}

/** The kept camera of the phone that took the open photo, as its EXIF names it. */
export const likelyCamera = computed(() => {
  const taken = image.value?.opened.metadata;
  if (!taken?.cameraModel) return null;
  return (
    keptCameras.value.find(
      ({ device }) => device?.model === taken.cameraModel && device?.make === taken.cameraMake,
    ) ?? null
  );
});
