import { BRUSHES } from '../stage/brush.ts';
import { brush, change, setup } from '../state.ts';

/** The brush: how broad it is, and a way to wipe all strokes off. */
export function BrushPad() {
  const { strokes, ...rest } = setup.value;
  return (
    <>
      <fieldset class="segments brushes" aria-label="Brush">
        {BRUSHES.map(([name, width]) => (
          <button
            key={name}
            type="button"
            aria-pressed={brush.value === width}
            onClick={() => (brush.value = width)}
          >
            <i style={{ width: `${width / 2}px`, height: `${width / 2}px` }} />
            {name}
          </button>
        ))}
      </fieldset>
      {strokes && strokes.length > 0 ? (
        <button type="button" class="plain" onClick={() => change(rest)}>
          Wipe the painting off
        </button>
      ) : null}
    </>
  );
}
