import type { Observation } from './observation.ts';

type Unknown = (observation: Observation) => string | false | null | undefined;

const isOnWater = ({ viewpoint }: Observation) => viewpoint.from !== 'bench';

/** What field practice records of an observation, each as the sentence for where it is missing. */
const QUESTIONS: readonly Unknown[] = [
  ({ time }) => !time && 'The time of the observation.',
  ({ time }) => time && !time.utc && `The time in UTC: the clock said ${time.recorded} without an offset.`,
  ({ position, leftOut }) => !position && !leftOut.includes('position') && 'The position.',
  (o) =>
    isOnWater(o) && o.viewpoint.from === 'unknown' && 'Where the observer stood: aircraft, vessel or shore.',
  (o) =>
    isOnWater(o) &&
    !o.viewpoint.heightM &&
    `The height of the ${o.photo ? 'camera' : 'observer'} above the water.`,
  (o) =>
    isOnWater(o) &&
    !o.viewpoint.headingDeg &&
    `The direction in which the ${o.photo ? 'camera' : 'observer'} looked.`,
  (o) =>
    isOnWater(o) &&
    o.viewpoint.headingDeg &&
    !o.viewpoint.headingReference &&
    'Whether the heading is from true or magnetic north.',
  (o) => isOnWater(o) && o.conditions.windMS === undefined && 'The speed of the wind.',
  (o) => isOnWater(o) && o.conditions.windFromDeg === undefined && 'The direction of the wind.',
  (o) => isOnWater(o) && o.conditions.seaState === undefined && 'The state of the sea.',
  (o) => isOnWater(o) && !o.conditions.sky && 'The sky.',
  (o) => isOnWater(o) && !o.conditions.sun && !o.leftOut.includes('position') && 'Where the sun stood.',
  ({ conditions, photo }) =>
    photo && !conditions.polariser && 'Whether a polariser, or polarised glass, was in front of the lens.',
  (o) =>
    isOnWater(o) &&
    !o.substance &&
    (o.setup
      ? 'What the film is: the thickness stands for the film chosen in the set-up.'
      : 'What the film is.'),
  (o) =>
    isOnWater(o) &&
    !o.lookAlikes &&
    'Whether it could be something other than oil: no look-alike was checked.',
  ({ photo, setup }) =>
    photo &&
    !setup?.references?.clean &&
    !setup?.references?.white &&
    'The colour of the light: no reference is marked in the photo.',
  ({ photo }) => photo && !photo.metadata.cameraModel && 'Which camera took the photo.',
  ({ photo, leftOut }) =>
    photo && leftOut.includes('original') && 'The original photo: it was left out on purpose.',
  (o) => isOnWater(o) && o.photo && o.result && !o.result.area && 'The oiled area: the photo gives no scale.',
  ({ leftOut }) => leftOut.includes('position') && 'The position: it was left out on purpose.',
  (o) => isOnWater(o) && o.toldTo.length === 0 && 'Who has been told.',
];

/** The list of what was not known, as sentences, in the order in which a report has them. */
export function notKnown(observation: Observation): string[] {
  return QUESTIONS.flatMap((question) => question(observation) || []);
}
