import { effect } from '@preact/signals';
import { openDB } from 'idb';
import type { Setup } from '../engine/setup.ts';
import { image, setup, step, theme } from './state.ts';

/** Work in progress, kept so that a reload, an update or an empty battery loses nothing. */
const SETUP_KEY = 'tintfathom.setup';
const THEME_KEY = 'tintfathom.theme';

const database = () =>
  openDB('tintfathom-work', 1, {
    upgrade: (db) => {
      db.createObjectStore('photo');
    },
  });

/** Keeps the set-up and the step. Storage that is full or forbidden is no reason to stop working. */
export function keepSetup(): void {
  try {
    localStorage.setItem(
      SETUP_KEY,
      JSON.stringify({ name: image.value?.name, setup: setup.value, step: step.value }),
    );
  } catch {
    // Nothing is lost that is on the screen; only a reload would start afresh.
  }
}

/** Keeps every change of the set-up and the step as it is made, while a photo is open. */
export function keepChanges(): void {
  effect(() => {
    if (image.value && setup.value && step.value) keepSetup();
  });
}

/** The set-up last kept, and the name of the photo that it belongs to. */
export function keptSetup(): { readonly name?: string; readonly setup: Setup; readonly step: string } | null {
  try {
    const text = localStorage.getItem(SETUP_KEY);
    return text ? (JSON.parse(text) as { name?: string; setup: Setup; step: string }) : null;
  } catch {
    return null;
  }
}

export async function keepPhoto(blob: Blob, name: string): Promise<void> {
  try {
    const db = await database();
    await db.put('photo', { blob, name }, 'open');
    db.close();
    // Asked once there is something to lose; a browser that says no may still keep it.
    await navigator.storage?.persist?.();
  } catch {
    // See keepSetup.
  }
}

export async function keptPhoto(): Promise<{ readonly blob: Blob; readonly name: string } | null> {
  try {
    const db = await database();
    const kept: unknown = await db.get('photo', 'open');
    db.close();
    return kept && typeof kept === 'object' && 'blob' in kept ? (kept as { blob: Blob; name: string }) : null;
  } catch {
    return null;
  }
}

export async function forgetPhoto(): Promise<void> {
  try {
    const db = await database();
    await db.delete('photo', 'open');
    db.close();
  } catch {
    // See keepSetup.
  }
}

export function keepTheme(): void {
  showTheme();
  try {
    localStorage.setItem(THEME_KEY, theme.value);
  } catch {
    // See keepSetup.
  }
}

export function restoreTheme(): void {
  try {
    if (localStorage.getItem(THEME_KEY) === 'sunlight') theme.value = 'sunlight';
  } catch {
    // See keepSetup.
  }
  showTheme();
}

function showTheme(): void {
  document.documentElement.dataset.theme = theme.value;
  const ground = getComputedStyle(document.documentElement).getPropertyValue('--ground').trim();
  document.querySelector('meta[name="theme-color"]')?.setAttribute('content', ground);
}
