import { add, type Complex, complex, divide, multiply, ONE, phase, subtract } from './complex.ts';
import { admittance, complexIndex, cosineInside, reflectionCoefficient } from './fresnel.ts';
import type { FilmStack, Material } from './types.ts';

/**
 * A film stack at one wavelength, angle and polarisation, with everything above and below the film folded into
 * amplitude coefficients: what is left is a closed form in the film's thickness,
 * r = top + through z / (1 - under z), z = bottom exp(2 i beta d).
 */
export interface FoldedSides {
  /** Reflection of all above the film, seen from the ambient side and from inside the film. */
  readonly top: Complex;
  readonly under: Complex;
  /** Transmission down times transmission up through all above the film. */
  readonly through: Complex;
  /** Reflection of all below the film, seen from inside the film. */
  readonly bottom: Complex;
  /** Phase (complex) of one double pass per nanometre of film: 4 pi n cos / wavelength. */
  readonly doublePassPerNm: Complex;
}

interface Medium {
  readonly eta: Complex;
  readonly normal: Complex;
}

function medium(
  material: Material,
  wavelengthNm: number,
  tangential: number,
  polarisation: 's' | 'p',
): Medium {
  const index = complexIndex(material, wavelengthNm);
  const cosine = cosineInside(index, tangential);
  return { eta: admittance(index, cosine, polarisation), normal: multiply(index, cosine) };
}

function doublePass(normal: Complex, wavelengthNm: number): Complex {
  return multiply(normal, complex((4 * Math.PI) / wavelengthNm));
}

/** Folds the fixed layers. Composition of two-ports: Born & Wolf 1.6.3; the signs are those of the coefficients. */
export function foldSides(
  stack: FilmStack,
  wavelengthNm: number,
  incidenceRad: number,
  polarisation: 's' | 'p',
): FoldedSides {
  const tangential = stack.ambient.refractiveIndex(wavelengthNm) * Math.sin(incidenceRad);
  const inside = (material: Material) => medium(material, wavelengthNm, tangential, polarisation);
  const film = inside(stack.film);

  let before = inside(stack.ambient);
  let top: Complex = { re: 0, im: 0 };
  let under: Complex = { re: 0, im: 0 };
  let through: Complex = ONE;
  let pass: Complex = ONE;
  for (const next of [
    ...stack.above.map((layer) => ({ ...inside(layer.material), thicknessNm: layer.thicknessNm })),
    { ...film, thicknessNm: 0 },
  ]) {
    const r = reflectionCoefficient(before.eta, next.eta);
    const bounce = subtract(ONE, multiply(multiply(under, r), pass));
    const ahead = divide(pass, bounce);
    top = add(top, multiply(multiply(through, r), ahead));
    const both = subtract(ONE, multiply(r, r));
    under = add({ re: -r.re, im: -r.im }, multiply(multiply(both, under), ahead));
    through = divide(multiply(multiply(through, both), pass), multiply(bounce, bounce));
    pass = phase(multiply(doublePass(next.normal, wavelengthNm), complex(next.thicknessNm)));
    before = next;
  }

  let bottom: Complex | null = null;
  let below = inside(stack.substrate);
  for (const layer of [...stack.below].reverse()) {
    const here = inside(layer.material);
    const own = reflectionCoefficient(here.eta, below.eta);
    const seen = bottom === null ? own : combine(own, bottom);
    bottom = multiply(
      seen,
      phase(multiply(doublePass(here.normal, wavelengthNm), complex(layer.thicknessNm))),
    );
    below = here;
  }
  const last = reflectionCoefficient(film.eta, below.eta);
  return {
    top,
    under,
    through,
    bottom: bottom === null ? last : combine(last, bottom),
    doublePassPerNm: doublePass(film.normal, wavelengthNm),
  };
}

/** Reflection of an interface with something reflecting `behind` it, the pass between already in `behind`. */
function combine(interfaceR: Complex, behind: Complex): Complex {
  return divide(add(interfaceR, behind), add(ONE, multiply(interfaceR, behind)));
}
