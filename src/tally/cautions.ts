import type { Notice } from '../view/notice.ts';

/** To be read before going near, in this order. Printed with every report. */
export const SAFETY_CAUTIONS: readonly Notice[] = [
  {
    code: 'safety-duties',
    text: 'Your other duties come first: leave the measurement if it takes you from them, and in an aircraft or boat the crew decides.',
  },
  {
    code: 'safety-vapour',
    text: 'Light oils give off benzene and vapour that burns and lies low in hollows. Come from upwind, keep flames and sparks away, and leave at the first smell, headache or stinging eyes. Never sniff to find out.',
  },
  {
    code: 'safety-footing',
    text: 'Oiled ground is slippery. Near water wear a life jacket, have a second person with you, and do not lean out for a photo.',
  },
  {
    code: 'safety-no-contact',
    text: 'Do not touch the film. Never enter the water, a drain, a tank or any closed space for a reading.',
  },
  {
    code: 'safety-no-soap',
    text: 'Put no soap or dispersant on it: that hides it, harms more, and is often against the law.',
  },
];

/** What the figures are not, and who decides. */
export const USE_CAUTIONS: readonly Notice[] = [
  {
    code: 'use-indicative',
    text: 'Thickness and volume from a photo are indicative. Hand over both volumes, never one alone.',
  },
  {
    code: 'use-report-now',
    text: 'The duty to report does not wait for a number: in many places any visible film must be reported, whatever its volume.',
  },
  {
    code: 'use-authority',
    text: 'What to do about it (booms, dispersant, closures, advice on health) is for the responsible authority to decide.',
  },
];
