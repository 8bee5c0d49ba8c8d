import { signal } from '@preact/signals';
import { Workbox } from 'workbox-window';
import { image, progress } from './state.ts';

/** A newer version waits; it takes over only when the person says so, and never while something is being computed. */
const waiting = signal<Workbox | null>(null);

export function watchForUpdates(): void {
  if (!import.meta.env.PROD || !('serviceWorker' in navigator)) return;
  const workbox = new Workbox('./serviceWorker.js', { scope: './' });
  workbox.addEventListener('waiting', () => {
    waiting.value = workbox;
  });
  void workbox.register();
}

function takeOver(workbox: Workbox): void {
  workbox.addEventListener('controlling', () => location.reload());
  workbox.messageSkipWaiting();
}

/** Work in progress is kept on the device, so an update costs one tap on "go on". */
export function UpdatePrompt() {
  const workbox = waiting.value;
  if (!workbox || progress.value) return null;
  return (
    <div class="toast" role="status">
      <span>A new version is ready.{image.value ? ' Your photo and marks are kept.' : ''}</span>
      <button type="button" class="primary" onClick={() => takeOver(workbox)}>
        Update
      </button>
      <button type="button" onClick={() => (waiting.value = null)}>
        Later
      </button>
    </div>
  );
}
