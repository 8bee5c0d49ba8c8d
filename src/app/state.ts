import { batch, computed, signal } from '@preact/signals';
import type { EstimateResult, OpenedPhoto, Probe } from '../engine/contract.ts';
import type { FilmPreset, Point, Rectangle, Setup } from '../engine/setup.ts';
import { changeBetween } from '../engine/setupChanges.ts';
import type { ThicknessMap } from '../match/types.ts';
import { hasMark, type MarkId } from './stage/grips.ts';

/** The steps of a reading, in the order a person takes them. */
export const STEPS = ['film', 'light', 'mark', 'view', 'map', 'amount'] as const;
export type Step = (typeof STEPS)[number];

/** The steps that suit a film: where the camera stood and how much there is are asked of films on water only. */
export function stepsFor(film: Setup['film']): readonly Step[] {
  return onWater(film) ? STEPS : STEPS.filter((id) => id !== 'view' && id !== 'amount');
}

/** What marking adds: a reference patch, the corners of the region, a stroke of the brush, or a pin. */
export type MarkKind = 'clean' | 'white' | 'dark' | 'region' | 'out' | 'in' | 'bare' | 'order';

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
/** Full width of the brush on the screen, CSS pixels: one of `BRUSHES`. */
export const brush = signal(30);
/** The mark that handles and nudges act on. */
export const selected = signal<MarkId | null>(null);
/** A change under the finger: shown, not yet made. */
export const draftSetup = signal<Setup | null>(null);
export const result = signal<EstimateResult | null>(null);
/** A map to look at while there is no result: the last one, or a coarse one with the marks as they are now. */
export const preview = signal<ThicknessMap | null>(null);
export const probe = signal<Probe | null>(null);
export const probeAt = signal<Point | null>(null);
/** Share of the stage's width from which the map is shown, 0 = all map, 1 = all photo. */
export const wipe = signal(0);
export const mapView = signal<'thickness' | 'order'>('thickness');
export const progress = signal<{ readonly share: number; readonly step: string } | null>(null);
export const failure = signal<string | null>(null);
export const theme = signal<'dark' | 'sunlight'>('dark');

const MOST_UNDO = 100;

/** Nudges of one mark in a row are one thing to undo. */
let lastSeries: string | null = null;

/**
 * Changes the set-up; a reading made with the old one is put aside, and comes back with an undo.
 * @param series changes in a row with the same name are undone together
 */
export function change(next: Setup, series: string | null = null): void {
  if (series === null || series !== lastSeries)
    past.value = [...past.value.slice(1 - MOST_UNDO), setup.value];
  future.value = [];
  replace(next);
  lastSeries = series;
}

function replace(next: Setup): void {
  lastSeries = null;
  batch(() => {
    setup.value = next;
    judgeResult();
    probe.value = null;
    draftSetup.value = null;
    if (selected.value && !hasMark(next, selected.value)) selected.value = null;
  });
}

/** The last reading and what it was made with. */
let measured: { readonly setup: Setup; readonly result: EstimateResult } | null = null;

/** Takes the last reading as the result where it is true of the present set-up, else at most as a preview. */
function judgeResult(): void {
  const change = measured ? changeBetween(measured.setup, setup.value) : 'all';
  result.value = measured && change === 'none' ? measured.result : null;
  preview.value =
    change === 'orders' || change === 'mask' ? (preview.value ?? measured?.result.map ?? null) : null;
}

/** Keeps a reading; it becomes the result unless the set-up has changed since. */
export function keepResult(done: EstimateResult, madeWith: Setup): void {
  measured = { setup: madeWith, result: done };
  preview.value = null;
  judgeResult();
}

/** Lets go of the last reading, so that two of them never take up memory at once; a coarse preview stays. */
export function dropResult(): void {
  if (preview.value === measured?.result.map) preview.value = null;
  measured = null;
  result.value = null;
}

export function undo(): void {
  const last = past.value.at(-1);
  if (!last) return;
  future.value = [setup.value, ...future.value];
  past.value = past.value.slice(0, -1);
  replace(last);
  if (!selected.value) chooseMarking(marking.value);
}

export function redo(): void {
  const next = future.value[0];
  if (!next) return;
  past.value = [...past.value, setup.value];
  future.value = future.value.slice(1);
  replace(next);
  if (!selected.value) chooseMarking(marking.value);
}

/** A fresh set-up for a newly opened photo. */
export function begin(next: Setup): void {
  past.value = [];
  future.value = [];
  dropResult();
  replace(next);
}

/** A kind of mark to place; where the photo has a reference of that kind, its handles are shown. */
export function chooseMarking(kind: MarkKind): void {
  marking.value = kind;
  const isReference = kind === 'clean' || kind === 'white' || kind === 'dark';
  selected.value = isReference && setup.value.references?.[kind] ? { kind } : null;
}

/** The kind of mark to begin with: the reference that is there, else the one that suits the film. */
export function beginMarking(): void {
  const { clean, white, dark } = setup.value.references ?? {};
  chooseMarking(
    clean ? 'clean' : white ? 'white' : dark ? 'dark' : onWater(setup.value.film) ? 'clean' : 'white',
  );
}

export function setReference(kind: 'clean' | 'white' | 'dark', rectangle: Rectangle | null): void {
  const { [kind]: _, ...others } = setup.value.references ?? {};
  change({ ...setup.value, references: rectangle ? { ...others, [kind]: rectangle } : others });
  selected.value = rectangle ? { kind } : null;
}

export function addPin(at: Point, pin: { readonly is: 'bare' } | { readonly order: number }): void {
  const pins = [...(setup.value.pins ?? []), { at, ...pin }];
  change({ ...setup.value, pins });
  selected.value = { kind: 'pin', index: pins.length - 1 };
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
