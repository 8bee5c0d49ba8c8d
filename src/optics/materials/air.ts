import { transparent } from './make.ts';

/** Index of air at 15 °C and 101 325 Pa in the middle of the visible; its own dispersion (3e-6) does not show. */
export const AIR_INDEX = 1.00027;

/** Air. Ciddor 1996 gives 1.000277 to 1.000283 across the visible at 15 °C; value rounded, from memory. */
export const air = transparent(
  'air',
  'air',
  'Ciddor 1996, Applied Optics 35, 1566 (rounded, from memory)',
  [380, 780],
  () => AIR_INDEX,
);
