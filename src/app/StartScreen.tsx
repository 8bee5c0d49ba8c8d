import { useEffect, useState } from 'preact/hooks';
import { parseDemo } from './demos.ts';
import { keptPhoto, keptSetup } from './keep.ts';
import { Icon } from './parts/Icon.tsx';
import { ThemeButton } from './parts/ThemeButton.tsx';
import { cancel, openPhoto } from './session.ts';
import { failure, progress, STEPS, type Step, step } from './state.ts';

const DEMOS = [
  { id: 'harbour', name: 'Sheen in a harbour' },
  { id: 'soap-film', name: 'Draining soap film' },
] as const;

/** First screen: what it is, take or open a photo, or try one of two made-up ones. */
export function StartScreen() {
  const [kept, setKept] = useState<{ blob: Blob; name: string } | null>(null);
  useEffect(() => {
    void keptPhoto().then(setKept);
    const paste = (event: ClipboardEvent) => {
      const file = [...(event.clipboardData?.files ?? [])].find((f) => f.type.startsWith('image/'));
      if (file) void openPhoto(file, file.name || 'pasted');
    };
    addEventListener('paste', paste);
    return () => removeEventListener('paste', paste);
  }, []);
  const pick = (event: Event & { currentTarget: HTMLInputElement }) => {
    const file = event.currentTarget.files?.[0];
    if (file) void openPhoto(file, file.name);
  };
  const again = async () => {
    const before = keptSetup();
    if (!kept || !(await openPhoto(kept.blob, kept.name, before?.setup))) return;
    if (before && STEPS.includes(before.step as Step)) step.value = before.step as Step;
  };
  const openDemo = async (id: (typeof DEMOS)[number]['id']) => {
    try {
      const { blob, setup } = await parseDemo(id);
      await openPhoto(blob, `${id}.jpg`, setup);
    } catch (error) {
      failure.value = error instanceof Error ? error.message : String(error);
    }
  };
  const busy = progress.value;
  return (
    <main
      class="page"
      onDragOver={(event) => event.preventDefault()}
      onDrop={(event) => {
        event.preventDefault();
        const file = event.dataTransfer?.files[0];
        if (file) void openPhoto(file, file.name);
      }}
    >
      <div class="bar">
        <h1>Tintfathom</h1>
        <a class="button" href="#/chart" aria-label="Colour chart">
          <Icon name="chart" />
        </a>
        <a class="button" href="#/about" aria-label="About">
          <Icon name="info" />
        </a>
        <ThemeButton />
      </div>
      <p>
        How thick is the film? The colours in a photo of oil on water, a soap film or a coating say it, with
        an interval, on this phone, without a network.
      </p>
      <p class="note small quiet">
        Indicative only. Vapour and wet edges hurt people: stay upwind, keep your footing, touch nothing,
        report first.
      </p>
      {failure.value ? (
        <p role="alert" class="warn">
          {failure.value}
        </p>
      ) : null}
      <div class="low">
        <h2>Try a made-up photo</h2>
        <div class="demos">
          {DEMOS.map(({ id, name }) => (
            <button key={id} type="button" onClick={() => void openDemo(id)}>
              <img src={`./demo/${id}.jpg`} alt="" loading="lazy" />
              <span>{name}</span>
            </button>
          ))}
        </div>
        {busy ? (
          <section aria-live="polite" aria-label="Working">
            <p>{busy.step}</p>
            <progress value={busy.share} max={1} aria-label={busy.step} />
            <button type="button" onClick={cancel}>
              Stop
            </button>
          </section>
        ) : null}
        {kept ? (
          <button type="button" onClick={() => void again()}>
            Go on with {kept.name}
          </button>
        ) : null}
        <label class="button">
          <Icon name="save" />
          Open a photo
          <input class="hidden-input" type="file" accept="image/*,.heic,.heif,.avif" onChange={pick} />
        </label>
        <label class="button primary">
          <Icon name="photo" />
          Take a photo
          <input class="hidden-input" type="file" accept="image/*" capture="environment" onChange={pick} />
        </label>
      </div>
    </main>
  );
}
