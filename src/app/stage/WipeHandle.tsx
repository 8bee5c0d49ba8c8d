import { useRef } from 'preact/hooks';
import { Icon } from '../parts/Icon.tsx';
import { wipe } from '../state.ts';

const KEY_STEP = 0.05;
const KEYS: Readonly<Record<string, (now: number) => number>> = {
  ArrowLeft: (now) => now - KEY_STEP,
  ArrowRight: (now) => now + KEY_STEP,
  Home: () => 0,
  End: () => 1,
};
const within = (share: number) => Math.min(1, Math.max(0, share));

/** The handle on the edge between photo (left) and map (right). The sheet has buttons that do the same by a tap. */
export function WipeHandle() {
  const held = useRef(false);
  const share = wipe.value;
  const follow = (event: PointerEvent & { currentTarget: HTMLElement }) => {
    const box = event.currentTarget.parentElement?.getBoundingClientRect();
    if (held.current && box) wipe.value = within((event.clientX - box.left) / box.width);
  };
  return (
    <div
      class="wipe over"
      role="slider"
      tabIndex={0}
      aria-label="Edge between photo and map"
      aria-valuemin={0}
      aria-valuemax={100}
      aria-valuenow={Math.round(100 * share)}
      aria-valuetext={
        share <= 0 ? 'map only' : share >= 1 ? 'photo only' : `photo ${Math.round(100 * share)} %`
      }
      // Set through the style object, which the page's security policy allows; kept whole at the stage's edges.
      style={{ left: `clamp(28px, ${100 * share}%, 100% - 28px)` }}
      onPointerDown={(event) => {
        held.current = true;
        event.currentTarget.setPointerCapture(event.pointerId);
      }}
      onPointerMove={follow}
      onPointerUp={() => (held.current = false)}
      onPointerCancel={() => (held.current = false)}
      onKeyDown={(event) => {
        const next = KEYS[event.key];
        if (!next) return;
        event.preventDefault();
        wipe.value = within(next(share));
      }}
    >
      <Icon name="wipe" />
    </div>
  );
}
