import { computed, signal } from '@preact/signals';
import type { EstimateResult, OpenedPhoto, Probe } from '../engine/contract.ts';
import type { FilmPreset, Point, Rectangle, Setup } from '../engine/setup.ts';

/** The steps of a reading, in the order a person takes them. */
export const STEPS = ['film', 'light', 'mark', 'map'] as const;
export type Step = (typeof STEPS)[number];

/** What marking adds: a reference patch, a pin, or the corners of the region. */
export type MarkKind = 'clean' | 'white' | 'dark' | 'region' | 'bare' | 'order';

export interface OpenedImage {
  readonly blob: Blob;
  readonly name: string;
  readonly bitmap: ImageBitmap;
  readonly opened: OpenedPhoto;
}

/** Everything a person can change and undo. */
export const DEFAULT_SETUP: Setup = { film: 'soap', light: { daylightK: 6500 }, camera: 'phone' };

export const setup = signal<Setup>(DEFAULT_SETUP);
const past = signal<readonly Setup[]>([]);
const future = signal<readonly Setup[]>([]);
export const canUndo = computed(() => past.value.length > 0);
export const canRedo = computed(() => future.value.length > 0);

export const image = signal<OpenedImage | null>(null);
export const step = signal<Step>('film');
export const marking = signal<MarkKind>('clean');
export const pinOrder = signal(2);
export const result = signal<EstimateResult | null>(null);
export const probe = signal<Probe | null>(null);
export const probeAt = signal<Point | null>(null);
/** Share of the photo's width from which the map is shown, 0 = all map, 1 = all photo. */
export const wipe = signal(0);
export const mapView = signal<'thickness' | 'order'>('thickness');
export const progress = signal<{ readonly share: number; readonly step: string } | null>(null);
export const failure = signal<string | null>(null);
export const theme = signal<'dark' | 'sunlight'>('dark');

const MOST_UNDO = 100;

/** Changes the set-up; the reading made with the old one is put aside. */
export function change(next: Setup): void {
  past.value = [...past.value.slice(-MOST_UNDO), setup.value];
  future.value = [];
  replace(next);
}

function replace(next: Setup): void {
  setup.value = next;
  result.value = null;
  probe.value = null;
}

export function undo(): void {
  const last = past.value.at(-1);
  if (!last) return;
  future.value = [setup.value, ...future.value];
  past.value = past.value.slice(0, -1);
  replace(last);
}

export function redo(): void {
  const next = future.value[0];
  if (!next) return;
  past.value = [...past.value, setup.value];
  future.value = future.value.slice(1);
  replace(next);
}

/** A fresh set-up for a newly opened photo. */
export function begin(next: Setup): void {
  past.value = [];
  future.value = [];
  replace(next);
}

export function setReference(kind: 'clean' | 'white' | 'dark', rectangle: Rectangle | null): void {
  const { [kind]: _, ...others } = setup.value.references ?? {};
  change({ ...setup.value, references: rectangle ? { ...others, [kind]: rectangle } : others });
}

export function addPin(at: Point, pin: { readonly is: 'bare' } | { readonly order: number }): void {
  change({ ...setup.value, pins: [...(setup.value.pins ?? []), { at, ...pin }] });
}

export function setRegion(region: readonly Point[] | null): void {
  const { region: _, ...rest } = setup.value;
  change(region ? { ...rest, region } : rest);
}

/** Whether the film lies on water, where clean water is the reference and safety at the water's edge matters. */
export function onWater(film: Setup['film']): boolean {
  return typeof film === 'string' && !NOT_ON_WATER.has(film);
}

const NOT_ON_WATER: ReadonlySet<FilmPreset> = new Set(['soap', 'bubbleMix', 'magnesiumFluorideOnGlass']);
