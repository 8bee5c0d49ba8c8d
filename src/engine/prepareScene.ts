import type { Light } from '../colour/types.ts';
import type { FilmScene } from '../match/filmBasis.ts';
import { SHARP } from '../optics/blur.ts';
import { filmStackFor, isOilOnWater } from '../optics/filmPresets.ts';
import { materialById } from '../optics/materials/index.ts';
import { ownMaterial } from '../optics/materials/ownMaterial.ts';
import type { FilmStack, FixedLayer, Material } from '../optics/types.ts';
import type { MaterialSetup, Setup, StackSetup } from './setup.ts';

/** Light that is assumed when a set-up names none: an overcast sky. */
export const ASSUMED_LIGHT: Light = { daylightK: 6500 };

/** A set-up that cannot be carried out, in one sentence that says what to do. */
export class SetupError extends Error {
  override readonly name = 'SetupError';
}

function materialOf(setup: MaterialSetup): Material {
  return typeof setup === 'string' ? materialById(setup) : ownMaterial(setup);
}

function ownStack(setup: StackSetup): FilmStack {
  const measured = setup.layers.flatMap((layer, i) => (layer.thicknessNm === undefined ? [i] : []));
  if (measured.length !== 1) {
    throw new SetupError('Leave out thicknessNm for exactly one layer of the film: that layer is measured.');
  }
  const fixed = (layers: StackSetup['layers']): FixedLayer[] =>
    layers.map((layer) => ({ material: materialOf(layer.material), thicknessNm: layer.thicknessNm ?? 0 }));
  const at = measured[0]!;
  return {
    ambient: materialOf(setup.ambient),
    above: fixed(setup.layers.slice(0, at)),
    film: materialOf(setup.layers[at]!.material),
    below: fixed(setup.layers.slice(at + 1)),
    substrate: materialOf(setup.substrate),
  };
}

/** Turns a set-up into optics. @throws SetupError with a sentence when something in it is absurd */
export function prepareScene(setup: Setup): { readonly scene: FilmScene; readonly light: Light } {
  try {
    const stack =
      typeof setup.film === 'string'
        ? filmStackFor(setup.film, setup.water ? { water: setup.water } : {})
        : ownStack(setup.film);
    return {
      scene: {
        stack,
        incidenceRad: ((setup.incidenceDeg ?? 0) * Math.PI) / 180,
        polarisation: 'unpolarised',
        blur: SHARP,
      },
      light: setup.light ?? ASSUMED_LIGHT,
    };
  } catch (error) {
    if (error instanceof RangeError) throw new SetupError(error.message);
    throw error;
  }
}

/** Whether thickness 0 can occur on its own: a film on something can end, a film in air would only be a hole. */
export function canBeBare(setup: Setup, stack: FilmStack): boolean {
  if (typeof setup.film === 'string')
    return isOilOnWater(setup.film) || setup.film === 'magnesiumFluorideOnGlass';
  return stack.substrate.id !== stack.ambient.id;
}
