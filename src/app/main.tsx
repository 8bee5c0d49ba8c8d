import { type ComponentType, render } from 'preact';
import { useEffect, useState } from 'preact/hooks';
import './app.css';
import { targetFile } from './camera/targetState.ts';
import { keepChanges, restoreTheme } from './keep.ts';
import { StartScreen } from './StartScreen.tsx';
import { image } from './state.ts';
import { UpdatePrompt, watchForUpdates } from './update.tsx';

type Screen = ComponentType;

/** Screens that are not needed at first come when asked for. */
const LAZY: Readonly<Record<string, () => Promise<Screen>>> = {
  '#/about': async () => (await import('./AboutScreen.tsx')).AboutScreen,
  '#/chart': async () => (await import('./ChartRoute.tsx')).ChartRoute,
  '#/records': async () => (await import('./records/RecordsRoute.tsx')).RecordsRoute,
  target: async () => (await import('./camera/TargetRoute.tsx')).TargetRoute,
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
  // The records have screens of their own behind their first part: "#/records/ID".
  const part = hash.split('/').slice(0, 2).join('/');
  const key = LAZY[part] ? part : targetFile.value ? 'target' : image.value ? 'work' : 'start';
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
