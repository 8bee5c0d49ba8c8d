import type { EstimateResult } from '../engine/contract.ts';
import type { Setup } from '../engine/setup.ts';
import { ROW_PROFILE_HEADER, rowProfile } from '../record/rowProfile.ts';
import { inTurns } from './turns.ts';

/** Version of the app, from package.json at build time. */
declare const __APP_VERSION__: string;

/** Hands a file to the person. */
export function hand(name: string, content: Blob): void {
  const link = document.createElement('a');
  link.href = URL.createObjectURL(content);
  link.download = name;
  link.click();
  setTimeout(() => URL.revokeObjectURL(link.href), 10_000);
}

/** Summary as JSON: set-up, counts, quantiles, fit, notices, versions. Position is left out. */
export function summaryFile(
  setup: Setup,
  { summary }: EstimateResult,
  photo: { readonly name: string; readonly sha256: string },
): Blob {
  const content = {
    tintfathom: __APP_VERSION__,
    photo,
    setup,
    ...summary,
    indicative: 'Indicative only: the responsible authority decides.',
  };
  return new Blob([`${JSON.stringify(content, null, 2)}\n`], { type: 'application/json' });
}

/** Thickness by row as CSV, worked out in short turns. */
export async function rowsFile({ map }: EstimateResult): Promise<Blob> {
  const lineOf = rowProfile(map);
  const lines = [ROW_PROFILE_HEADER];
  const breathe = inTurns();
  for (let y = 0; y < map.height; y++) {
    const line = lineOf(y);
    if (line) lines.push(line);
    await breathe();
  }
  return new Blob([`${lines.join('\r\n')}\r\n`], { type: 'text/csv' });
}

/** What stands at the foot of a map that leaves the app. */
export const footLine = (photo: string) => `${photo} · indicative only · Tintfathom ${__APP_VERSION__}`;
