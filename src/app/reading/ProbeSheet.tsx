import type { Probe } from '../../engine/contract.ts';
import { Icon } from '../parts/Icon.tsx';
import { probeAt, probe as shownProbe } from '../state.ts';
import { readingWords } from '../words/reading.ts';

const css = (rgb: readonly number[]) => `rgb(${rgb.map((v) => Math.round(v)).join(' ')})`;

/** A colour drawn as SVG, because the page's security policy forbids inline style in markup. */
function Swatch({ rgb, label }: { readonly rgb: readonly number[]; readonly label: string }) {
  return (
    <svg
      viewBox="0 0 1 1"
      preserveAspectRatio="none"
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
  calibrated,
}: {
  readonly probe: Probe;
  readonly resolvableToNm: number;
  readonly calibrated: boolean;
}) {
  const words = readingWords(probe, resolvableToNm);
  const close = () => {
    shownProbe.value = null;
    probeAt.value = null;
  };
  return (
    <section aria-live="polite" aria-label="Reading">
      <div class="headline">
        <h1 class="reading">
          {words.big}
          <small>{words.quiet}</small>
        </h1>
        <button type="button" class="plain" aria-label="Close the reading" onClick={close}>
          <Icon name="remove" />
        </button>
      </div>
      <div class="seen">
        <figure class="swatch">
          <div>
            <Swatch rgb={probe.seen} label="Colour seen" />
            {probe.matched ? <Swatch rgb={probe.matched} label="Chart colour" /> : null}
          </div>
          <figcaption>{probe.matched ? 'seen | chart' : 'seen'}</figcaption>
        </figure>
        <p>{words.sentence}</p>
      </div>
      {calibrated ? null : <p class="badge warn">Uncalibrated: mark clean surface or a card</p>}
    </section>
  );
}
