import { headingOf, sunOf } from '../../engine/tallyNotices.ts';
import { glintReport } from '../../view/glint.ts';
import { slopeVariance } from '../../view/seaSlope.ts';
import { sunNotices } from '../../view/sun.ts';
import { image, setup } from '../state.ts';
import { sketch } from '../viewState.ts';
import { sunWords } from '../words/sunWords.ts';

/** Wind taken for glitter where nobody said: a light breeze. */
const USUAL_WIND_MS = 3;

/** Where the sun stood, and whether its glitter lies on the water in the photo. */
export function SunNote() {
  const metadata = image.value?.opened.metadata;
  const sun = sunOf(setup.value, metadata);
  if (!sun) {
    return (
      <p class="small quiet">
        Where the sun stood is not known: the photo has no{' '}
        {metadata?.position ? 'time with an offset' : 'position'}.
      </p>
    );
  }
  const headingDeg = headingOf(setup.value, metadata);
  const { seen } = sketch.value;
  const glint =
    seen && headingDeg !== null
      ? glintReport(
          seen.view,
          sun,
          headingDeg,
          slopeVariance(setup.value.windMS ?? USUAL_WIND_MS, 'clean').total,
        )
      : null;
  const words = sunWords(sun, headingDeg);
  const outlook = glint ? (glint.notice ? `. ${glint.notice.text}` : ': no glitter on this water.') : '.';
  return (
    <>
      {words ? (
        <p class={glint?.notice ? 'small warn' : 'small quiet'}>
          {words}
          {outlook}
        </p>
      ) : null}
      {sunNotices(sun).map(({ code, text }) => (
        <p key={code} class="small warn">
          {text}
        </p>
      ))}
    </>
  );
}
