import { type ComponentType, render } from 'preact';
import { useEffect, useState } from 'preact/hooks';
import './app.css';
import { keepChanges, restoreTheme } from './keep.ts';
import { StartScreen } from './StartScreen.tsx';
import { image } from './state.ts';
import { UpdatePrompt, watchForUpdates } from './update.tsx';

type Screen = ComponentType;

/** Screens that are not needed at first come when asked for. */
const LAZY: Readonly<Record<string, () => Promise<Screen>>> = {
  '#/about': async () => (await import('./AboutScreen.tsx')).AboutScreen,
  '#/chart': async () => (await import('./ChartRoute.tsx')).ChartRoute,
  work: async () => (await import('./WorkScreen.tsx')).WorkScreen,
};

function useHash(): string {
  const [hash, setHash] = useState(location.hash);
  useEffect(() => {
    const changed = () => setHash(location.hash);
    addEventListener('hashchange', changed);
    return () => removeEventListener('hashchange', changed);
  }, []);
  return hash;
}

function App() {
  const hash = useHash();
  const key = LAZY[hash] ? hash : image.value ? 'work' : 'start';
  const [loaded, setLoaded] = useState<{ key: string; Screen: Screen } | null>(null);
  useEffect(() => {
    const load = LAZY[key];
    if (!load || loaded?.key === key) return;
    void load().then((Screen) => setLoaded({ key, Screen }));
  }, [key, loaded]);
  const Screen = key === 'start' ? StartScreen : loaded?.key === key ? loaded.Screen : null;
  return (
    <>
      {Screen ? <Screen /> : <main class="page" aria-busy="true" />}
      <UpdatePrompt />
    </>
  );
}

restoreTheme();
keepChanges();
const root = document.getElementById('app');
if (root) render(<App />, root);
watchForUpdates();
