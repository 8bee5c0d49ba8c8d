import { useEffect, useRef, useState } from 'preact/hooks';
import type { OpenedPhoto } from '../../engine/contract.ts';
import type { Engine } from '../../engine/engine.client.ts';
import type { TargetReading } from '../../engine/measureTarget.ts';
import type { FourCorners } from '../../photo/targetColours.ts';
import { Icon } from '../parts/Icon.tsx';
import type { Size } from '../stage/viewTransform.ts';
import { setup } from '../state.ts';
import { KeepCamera } from './KeepCamera.tsx';
import { chooseCamera, keptCameras } from './keptCameras.ts';
import { TargetFrame } from './TargetFrame.tsx';
import { targetFile } from './targetState.ts';

/** Corners to begin with: a target that fills most of the photo. */
function firstCorners({ width, height }: Size): FourCorners {
  const side = Math.min(0.7 * width, (0.7 * height * 6) / 4);
  const [x, y] = [(width - side) / 2, (height - (side * 4) / 6) / 2];
  return [
    [x, y],
    [x + side, y],
    [x + side, y + (side * 4) / 6],
    [x, y + (side * 4) / 6],
  ];
}

interface Open {
  readonly opened: OpenedPhoto;
  readonly url: string;
}

/** A photo of the 24-patch target: drag four corners, measure, keep the camera. The film's photo waits untouched. */
export function TargetScreen({ file }: { readonly file: File }) {
  const engine = useRef<Engine | null>(null);
  const [open, setOpen] = useState<Open | null>(null);
  const [corners, setCorners] = useState<FourCorners | null>(null);
  const [reading, setReading] = useState<TargetReading | null>(null);
  const [fault, setFault] = useState<string | null>(null);
  const [isBusy, setBusy] = useState(true);

  useEffect(() => {
    let isGone = false;
    const url = URL.createObjectURL(file);
    // An engine of its own, so that the film's photo stays open in the other.
    void import('../../engine/createEngine.client.ts')
      .then(async ({ createEngine }) => {
        if (isGone) return;
        engine.current = createEngine();
        const opened = await engine.current.openPhoto(file, file.name).promise;
        if (isGone) return;
        setOpen({ opened, url });
        setCorners(firstCorners(opened));
      })
      .catch((error: unknown) => setFault(error instanceof Error ? error.message : String(error)))
      .finally(() => setBusy(false));
    return () => {
      isGone = true;
      engine.current?.dispose();
      URL.revokeObjectURL(url);
    };
  }, [file]);

  const close = () => {
    targetFile.value = null;
  };
  const measure = async () => {
    if (!engine.current || !corners) return;
    setBusy(true);
    setFault(null);
    try {
      setReading(await engine.current.target(corners, setup.value.light).promise);
    } catch (error) {
      setFault(error instanceof Error ? error.message : String(error));
    } finally {
      setBusy(false);
    }
  };
  const move = (next: FourCorners) => {
    setCorners(next);
    setReading(null);
    setFault(null);
  };

  return (
    <main class="work">
      <div class="stage">
        {open && corners ? (
          <TargetFrame url={open.url} photo={open.opened} corners={corners} onMove={move} />
        ) : null}
        <div class="top">
          <button type="button" class="over" onClick={close} aria-label="Back to the film">
            <Icon name="back" />
          </button>
        </div>
      </div>
      <div class="sheet">
        <div class="content">
          <section aria-label="Colour target" aria-busy={isBusy} aria-live="polite">
            <h1>{reading ? 'The target is measured' : 'Drag the corners onto the target'}</h1>
            {fault ? (
              <p role="alert" class="note warn">
                {fault}
              </p>
            ) : null}
            {reading ? (
              <>
                <p class="small">{reading.advice}</p>
                {open ? (
                  <KeepCamera
                    camera={reading.camera}
                    metadata={open.opened.metadata}
                    onKept={(name) => {
                      chooseCamera(keptCameras.value.find((camera) => camera.name === name) ?? null);
                      close();
                    }}
                  />
                ) : null}
              </>
            ) : (
              <p class="quiet">
                The 24-patch target, six by four: a corner on the outer corner of each corner patch. Same
                light all over it, no glare. Any way round.
              </p>
            )}
          </section>
        </div>
        <div class="act single">
          {reading ? (
            <button type="button" class="plain" onClick={() => setReading(null)}>
              Drag the corners again
            </button>
          ) : (
            <button
              type="button"
              class="primary"
              disabled={isBusy || !corners}
              onClick={() => void measure()}
            >
              {isBusy ? 'One moment' : 'Measure the colours'}
            </button>
          )}
        </div>
      </div>
    </main>
  );
}
