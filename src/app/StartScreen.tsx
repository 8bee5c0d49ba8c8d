import { useEffect, useState } from 'preact/hooks';
import { parseDemo } from './demos.ts';
import { keptPhoto, keptSetup } from './keep.ts';
import { Icon } from './parts/Icon.tsx';
import { ThemeButton } from './parts/ThemeButton.tsx';
import { cancel, openPhoto } from './session.ts';
import { beginMarking, failure, progress, STEPS, type Step, step } from './state.ts';

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
    const own = before?.name === kept?.name ? before : null;
    if (!kept || !(await openPhoto(kept.blob, kept.name, own?.setup))) return;
    if (own && STEPS.includes(own.step as Step)) step.value = own.step as Step;
    if (step.value === 'mark') beginMarking();
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
        <img class="sign" src="./icons/icon.svg" alt="" width="44" height="44" />
        <h1>Tintfathom</h1>
        <a class="button" href="#/about" aria-label="About">
          <Icon name="info" />
        </a>
        <ThemeButton />
      </div>
      <div class="hero">
        <p class="lead">Every colour is a thickness.</p>
        <img
          src="./icons/film-band.svg"
          alt="Colours of a soap film from 0 nm, black, through five orders to 1,000 nm"
        />
        <ol aria-hidden="true">
          <li>0</li>
          <li>250</li>
          <li>500</li>
          <li>750</li>
          <li>1,000 nm</li>
        </ol>
      </div>
      {kept ? null : (
        <p class="quiet">
          Photograph oil on water, a soap film or a coating. Read how thick it is, and how sure that is, with
          no network.
        </p>
      )}
      <p class="note small quiet">
        Indicative only. Vapour and wet edges hurt people: stay upwind, keep your footing, touch nothing,
        report first.
      </p>
      {failure.value ? (
        <p role="alert" class="note warn">
          {failure.value}
        </p>
      ) : null}
      <div class="low">
        <h2>Try it on a made-up photo</h2>
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
          <button type="button" class="plain" onClick={() => void again()}>
            <Icon name="redo" />
            Go on with {kept.name}
          </button>
        ) : null}
        <div class="row stacked">
          <label class="button">
            <Icon name="open" />
            Open photo
            <input class="hidden-input" type="file" accept="image/*,.heic,.heif,.avif" onChange={pick} />
          </label>
          <a class="button" href="#/records/new">
            <Icon name="plus" />
            No photo
          </a>
          <a class="button" href="#/records">
            <Icon name="records" />
            Records
          </a>
          <a class="button" href="#/chart">
            <Icon name="chart" />
            Chart
          </a>
        </div>
        <label class="button primary">
          <Icon name="photo" />
          Take a photo
          <input class="hidden-input" type="file" accept="image/*" capture="environment" onChange={pick} />
        </label>
      </div>
    </main>
  );
}
