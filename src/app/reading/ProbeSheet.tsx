import type { Probe } from '../../engine/contract.ts';
import { readingWords } from '../words/reading.ts';
import { PosteriorCurve } from './PosteriorCurve.tsx';

const css = (rgb: readonly number[]) => `rgb(${rgb.map((v) => Math.round(v)).join(' ')})`;

/** A colour swatch drawn as SVG, because the page's security policy forbids inline style. */
function Swatch({ rgb, label }: { readonly rgb: readonly number[]; readonly label: string }) {
  return (
    <svg
      class="swatch"
      viewBox="0 0 1 1"
      role="img"
      aria-label={`${label} ${rgb.map((v) => Math.round(v)).join(', ')}`}
    >
      <rect width="1" height="1" fill={css(rgb)} />
    </svg>
  );
}

/** What is known of one place. */
export function ProbeSheet({
  probe,
  resolvableToNm,
}: {
  readonly probe: Probe;
  readonly resolvableToNm: number;
}) {
  const words = readingWords(probe, resolvableToNm);
  return (
    <section aria-live="polite" aria-label="Reading">
      <h1 class="reading">{words.big}</h1>
      <p class="quiet">{words.quiet}</p>
      <PosteriorCurve probe={probe} />
      <div class="swatches">
        <Swatch rgb={probe.seen} label="colour seen" />
        {probe.matched ? <Swatch rgb={probe.matched} label="chart colour" /> : null}
        <p class="small quiet">{probe.matched ? 'seen, and the chart’s colour' : 'seen'}</p>
      </div>
      <p>{words.sentence}</p>
    </section>
  );
}
