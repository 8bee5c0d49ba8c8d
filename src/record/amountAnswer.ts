import type { RecordedResult } from './observation.ts';

/**
 * What an amount by thickness stands for: figures, no oil on the water that was read, or no answer at all, where none of the
 * region's water could be read. A nought must never be taken for one of the last two.
 */
export function amountAnswer({ byThickness, area }: RecordedResult): 'figures' | 'noOil' | 'noAnswer' | null {
  if (!byThickness) return null;
  if (area && area.coverage === null) return 'noAnswer';
  return byThickness.oiledM2.most === 0 ? 'noOil' : 'figures';
}

export const ANSWER_WORDS = {
  noOil: 'No oil was read on the water that was looked at',
  noAnswer: 'No area and no volume: none of the water that was looked at gave an answer',
} as const;
