import { useEffect } from 'preact/hooks';
import type { KeptCamera } from '../../engine/keptCamera.ts';
import { Icon } from '../parts/Icon.tsx';
import { setup } from '../state.ts';
import {
  bringBack,
  chooseCamera,
  chosenCamera,
  forgetCamera,
  forgotten,
  keepFault,
  keptCameras,
  likelyCamera,
  loadCameras,
} from './keptCameras.ts';
import { targetFile } from './targetState.ts';
import './camera.css';

const day = (iso: string) =>
  new Date(iso).toLocaleDateString('en-GB', { day: 'numeric', month: 'short', year: 'numeric' });

/** The camera that this photo's phone has kept, one tap away, where it is not in use yet. */
export function CameraSuggestion() {
  useEffect(() => void loadCameras(), []);
  const likely = likelyCamera.value;
  if (!likely || chosenCamera.value || setup.value.camera === 'cie1931') return null;
  return (
    <button type="button" class="plain" onClick={() => chooseCamera(likely)}>
      <Icon name="photo" />
      Use “{likely.name}”, kept from this phone
    </button>
  );
}

/** Which camera took the photo: one kept from an earlier photo or a colour target, or none. */
export function CameraPart() {
  useEffect(() => void loadCameras(), []);
  const kept = keptCameras.value;
  const chosen = chosenCamera.value;
  const pick = (event: Event & { currentTarget: HTMLInputElement }) => {
    const file = event.currentTarget.files?.[0];
    if (file) targetFile.value = file;
    event.currentTarget.value = '';
  };
  return (
    <section aria-label="Camera" class="camera">
      <h2>This phone’s camera</h2>
      {kept.length > 0 ? (
        <ul class="cameras" aria-label="Kept cameras">
          <li>
            <button type="button" class="pick" aria-pressed={!chosen} onClick={() => chooseCamera(null)}>
              <span>
                Not known
                <small>the photo alone calibrates it</small>
              </span>
            </button>
          </li>
          {kept.map((camera) => (
            <Kept key={camera.name} camera={camera} isChosen={chosen?.name === camera.name} />
          ))}
        </ul>
      ) : (
        <p class="small quiet">
          None kept yet. Keep one after a photo with many film colours, or photograph a colour target.
        </p>
      )}
      {forgotten.value ? (
        <button type="button" class="plain" onClick={bringBack}>
          <Icon name="undo" />
          Bring back “{forgotten.value.name}”
        </button>
      ) : null}
      {keepFault.value ? (
        <p role="alert" class="note small warn">
          {keepFault.value}
        </p>
      ) : null}
      <div class="target-ways">
        <label class="button plain">
          <Icon name="photo" />
          Photograph a colour target
          <input class="hidden-input" type="file" accept="image/*" capture="environment" onChange={pick} />
        </label>
        <label class="button plain">
          <Icon name="open" />
          Open a photo of one
          <input class="hidden-input" type="file" accept="image/*,.heic,.heif,.avif" onChange={pick} />
        </label>
      </div>
    </section>
  );
}

function Kept({ camera, isChosen }: { readonly camera: KeptCamera; readonly isChosen: boolean }) {
  const from = camera.from === 'target' ? 'from a colour target' : 'from a film';
  return (
    <li>
      <button type="button" class="pick" aria-pressed={isChosen} onClick={() => chooseCamera(camera)}>
        <span>
          {camera.name}
          <small>
            {from}, {day(camera.madeAt)}
          </small>
        </span>
      </button>
      <button type="button" onClick={() => forgetCamera(camera)} aria-label={`Delete ${camera.name}`}>
        <Icon name="remove" />
      </button>
    </li>
  );
}
