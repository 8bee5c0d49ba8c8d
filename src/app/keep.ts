import { openDB } from 'idb';
import type { Setup } from '../engine/setup.ts';
import { setup, step, theme } from './state.ts';

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
    localStorage.setItem(SETUP_KEY, JSON.stringify({ setup: setup.value, step: step.value }));
  } catch {
    // Nothing is lost that is on the screen; only a reload would start afresh.
  }
}

export function keptSetup(): { readonly setup: Setup; readonly step: string } | null {
  try {
    const text = localStorage.getItem(SETUP_KEY);
    return text ? (JSON.parse(text) as { setup: Setup; step: string }) : null;
  } catch {
    return null;
  }
}

export async function keepPhoto(blob: Blob, name: string): Promise<void> {
  try {
    const db = await database();
    await db.put('photo', { blob, name }, 'open');
    db.close();
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
  document.documentElement.dataset.theme = theme.value;
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
  document.documentElement.dataset.theme = theme.value;
}
