import { beforeEach, describe, expect, it, vi } from 'vitest';
import {
  bringBack,
  chooseCamera,
  chosenCamera,
  forgetCamera,
  forgotten,
  keepCamera,
  keepFault,
  keptCameras,
} from '../../src/app/camera/keptCameras.ts';
import { setup, undo } from '../../src/app/state.ts';
import type { KeptCamera } from '../../src/engine/keptCamera.ts';
import { readKeptCamera } from '../../src/engine/keptCameraSchema.ts';
import { KEPT } from '../../src/match/cameraKnowledge.ts';

const held = new Map<string, string>();
let isFull = false;
vi.stubGlobal('localStorage', {
  getItem: (key: string) => held.get(key) ?? null,
  setItem: (key: string, value: string) => {
    if (isFull) throw new Error('full');
    held.set(key, value);
  },
});

function camera(name: string, firstMean = 0): KeptCamera {
  const covariance = Array.from({ length: KEPT }, (_, i) =>
    Array.from({ length: i + 1 }, (_, j) => (i === j ? 0.04 : 0)),
  ).flat();
  const mean = Array.from({ length: KEPT }, (_, k) => (k === 0 ? firstMean : 0));
  return {
    format: 'tintfathom camera',
    version: 1,
    name,
    madeAt: '2026-05-01T10:00:00Z',
    from: 'film',
    determined: 'well',
    encoding: 'srgb',
    mean,
    covariance,
  };
}

const stored = () => JSON.parse(held.get('tintfathom.cameras') ?? '[]') as unknown[];

describe('cameras kept on the device', () => {
  beforeEach(() => {
    isFull = false;
    keptCameras.value = [];
    forgotten.value = null;
    held.clear();
  });

  it('are stored as they read back, newest first', async () => {
    await keepCamera(camera('one'));
    await keepCamera(camera('two'));
    expect(keptCameras.value.map(({ name }) => name)).toEqual(['two', 'one']);
    expect(stored().map(readKeptCamera)).toEqual(keptCameras.value);
  });

  it('of the same name are replaced, and come back', async () => {
    await keepCamera(camera('one', 1));
    await keepCamera(camera('one', 2));
    expect(keptCameras.value.map(({ mean }) => mean[0])).toEqual([2]);
    bringBack();
    expect(keptCameras.value.map(({ mean }) => mean[0])).toEqual([1]);
    bringBack();
    expect(keptCameras.value.map(({ mean }) => mean[0])).toEqual([2]);
  });

  it('are deleted and brought back; a deleted one is no longer used', async () => {
    const one = camera('one');
    await keepCamera(one);
    chooseCamera(one);
    expect(chosenCamera.value).toEqual(one);
    forgetCamera(one);
    expect(keptCameras.value).toEqual([]);
    expect(setup.value.camera).toBe('phone');
    bringBack();
    expect(keptCameras.value).toEqual([one]);
    expect(forgotten.value).toBeNull();
    undo();
    expect(chosenCamera.value).toEqual(one);
  });

  it('say so when nothing can be kept, and lose nothing', async () => {
    await keepCamera(camera('one'));
    isFull = true;
    expect(await keepCamera(camera('two'))).toBe(false);
    expect(keptCameras.value.map(({ name }) => name)).toEqual(['one']);
    expect(keepFault.value).toMatch(/free some space/);
  });
});
