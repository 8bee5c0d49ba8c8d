import { useEffect, useState } from 'preact/hooks';
import { cameraNameFrom, type FittedCamera, nameCamera } from '../../engine/keptCamera.ts';
import type { PhotoMetadata } from '../../photo/types.ts';
import { Icon } from '../parts/Icon.tsx';
import { keepCamera, keepFault, keptCameras, loadCameras } from './keptCameras.ts';
import './camera.css';

/** The name to begin with. One from a target says so, so that it does not take the place of one from a film. */
function firstName(camera: FittedCamera, make: string | undefined, model: string | undefined): string {
  const phone = cameraNameFrom(make, model) || 'My phone';
  return camera.from === 'target' ? `${phone}, target` : phone;
}

interface Props {
  readonly camera: FittedCamera;
  readonly metadata: PhotoMetadata;
  readonly onKept?: (name: string) => void;
}

/** A name and one tap: the fitted camera stays for the next photo of this phone. */
export function KeepCamera({ camera, metadata, onKept }: Props) {
  useEffect(() => void loadCameras(), []);
  const { cameraMake: make, cameraModel: model } = metadata;
  const [name, setName] = useState(firstName(camera, make, model));
  const isKept = keptCameras.value.some(({ mean }) => mean.join() === camera.mean.join());
  if (isKept)
    return (
      <p class="note small" role="status">
        <Icon name="tick" /> Camera kept. The next photo of this phone can start from it: see Light.
      </p>
    );
  const replaces = keptCameras.value.some((other) => other.name === name.trim());
  const keep = async () => {
    const called = name.trim();
    if (!called) return;
    const named = nameCamera(camera, called, new Date().toISOString(), { make, model });
    if (await keepCamera(named)) onKept?.(called);
  };
  return (
    <form
      class="keep"
      aria-label="Keep this camera"
      onSubmit={(event) => {
        event.preventDefault();
        void keep();
      }}
    >
      <label class="field">
        Keep this camera as
        <input
          class="entry"
          maxLength={100}
          value={name}
          onInput={(event) => setName(event.currentTarget.value)}
        />
      </label>
      <button type="submit" disabled={!name.trim()}>
        {replaces ? 'Replace' : 'Keep'}
      </button>
      {keepFault.value ? (
        <p role="alert" class="note small warn">
          {keepFault.value}
        </p>
      ) : null}
    </form>
  );
}
