import { Icon, type IconName } from '../parts/Icon.tsx';
import { grownMark, movedMark, rectangleOf, withoutMark } from '../stage/grips.ts';
import { isViewMark } from '../stage/viewMarks.ts';
import { change, image, selected, setup } from '../state.ts';

/** One nudge, as a share of the photo's shorter side. */
const NUDGE = 0.005;
/** The horizon decides the tilt: there a nudge is a pixel of a phone's screen. */
const FINE_NUDGE = 0.001;
const ARROWS: readonly (readonly [IconName, string, number, number])[] = [
  ['left', 'left', -1, 0],
  ['up', 'up', 0, -1],
  ['down', 'down', 0, 1],
  ['right', 'right', 1, 0],
];

/** Everything that dragging does to the chosen mark, by taps. */
export function NudgePad() {
  const mark = selected.value;
  const photo = image.value?.opened;
  if (!mark || !photo) return null;
  const by = Math.max(
    1,
    Math.round((isViewMark(mark) ? FINE_NUDGE : NUDGE) * Math.min(photo.width, photo.height)),
  );
  const series = JSON.stringify(mark);
  return (
    <div class="nudges" role="toolbar" aria-label="Move the mark">
      {ARROWS.map(([icon, name, dx, dy]) => (
        <button
          key={name}
          type="button"
          aria-label={`Move ${name}`}
          onClick={() =>
            change(movedMark(setup.value, { mark, corner: null }, dx * by, dy * by, photo), `move ${series}`)
          }
        >
          <Icon name={icon} />
        </button>
      ))}
      {rectangleOf(setup.value, mark) ? (
        <>
          <button
            type="button"
            aria-label="Smaller"
            onClick={() => change(grownMark(setup.value, mark, -by, photo), `size ${series}`)}
          >
            <Icon name="minus" />
          </button>
          <button
            type="button"
            aria-label="Larger"
            onClick={() => change(grownMark(setup.value, mark, by, photo), `size ${series}`)}
          >
            <Icon name="plus" />
          </button>
        </>
      ) : null}
      <button
        type="button"
        aria-label="Remove this mark"
        onClick={() => change(withoutMark(setup.value, mark))}
      >
        <Icon name="remove" />
      </button>
    </div>
  );
}
