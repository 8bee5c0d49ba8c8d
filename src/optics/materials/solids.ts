import { sellmeier, transparent } from './make.ts';

/** Magnesium fluoride, ordinary ray. Dodge 1984, Applied Optics 23, 1980. */
export const magnesiumFluoride = transparent(
  'magnesiumFluoride',
  'magnesium fluoride (ordinary ray)',
  'Dodge 1984, Applied Optics 23, 1980 (19 °C)',
  [200, 7000],
  sellmeier([
    [0.48755108, 0.04338408 ** 2],
    [0.39875031, 0.09461442 ** 2],
    [2.3120353, 23.793604 ** 2],
  ]),
  0.003,
);

/** Borosilicate crown glass, N-BK7 type, by its maker's catalogue. */
export const crownGlass = transparent(
  'crownGlass',
  'crown glass (N-BK7 type)',
  'glass maker’s catalogue, Sellmeier coefficients',
  [300, 2500],
  sellmeier([
    [1.03961212, 0.00600069867],
    [0.231792344, 0.0200179144],
    [1.01046945, 103.560653],
  ]),
);

/** Window glass, soda lime. Rubin 1985, Solar Energy Materials 12, 275. */
export const windowGlass = transparent(
  'windowGlass',
  'window glass (soda lime)',
  'Rubin 1985, Solar Energy Materials 12, 275',
  [310, 4600],
  (l) => 1.513 - 0.003169 * (l / 1000) ** 2 + 0.003962 / (l / 1000) ** 2,
);
