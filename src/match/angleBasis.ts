import type { FilmBasis } from './filmBasis.ts';

/** Bases at any angle of a range. */
export interface AngleBasis {
  /** The basis at an incidence within the range, radians; outside it the curve is continued. */
  readonly at: (incidenceRad: number) => FilmBasis;
}

/** Angle between computed bases: the cubic between them is off by under 1e-3 of a value up to 75 degrees (tested). */
const NODE_RAD = (5 * Math.PI) / 180;
/** Steepest angle a basis is computed at. */
const LAST_RAD = (84 * Math.PI) / 180;
const FIELDS = ['table', 'perIndex', 'perMired'] as const;

/**
 * Bases for every angle of a range from a few computed ones. Rows stand for equal optical path, so that fringes stay
 * where they are as the angle changes and only contrast and brightness move: a cubic (Lagrange, four nodes) follows.
 * @param basisAt computes the basis at one angle; all must have the same rows
 */
export function angleBasis(
  basisAt: (incidenceRad: number) => FilmBasis,
  fromRad: number,
  toRad: number,
): AngleBasis {
  // Reflectance is even in the angle: from the vertical on, nodes start at 0 and none is needed before it.
  const first = Math.max(0, Math.min(fromRad - NODE_RAD, LAST_RAD - 3 * NODE_RAD));
  const last = Math.min(LAST_RAD, Math.max(toRad + NODE_RAD, first + 3 * NODE_RAD));
  const count = Math.max(4, Math.ceil((last - first) / NODE_RAD - 1e-9) + 1);
  const step = (last - first) / (count - 1);
  const nodes = Array.from({ length: count }, (_, k) => basisAt(first + k * step));
  return {
    at: (incidenceRad) => {
      const place = (incidenceRad - first) / step;
      const start = Math.max(0, Math.min(count - 4, Math.floor(place) - 1));
      const t = place - start;
      const weights = [
        -((t - 1) * (t - 2) * (t - 3)) / 6,
        (t * (t - 2) * (t - 3)) / 2,
        -(t * (t - 1) * (t - 3)) / 2,
        (t * (t - 1) * (t - 2)) / 6,
      ];
      const four = nodes.slice(start, start + 4);
      const mixed = FIELDS.map((field) =>
        mix(
          four.map((node) => node[field]),
          weights,
        ),
      );
      return { ...four[0]!, table: mixed[0]!, perIndex: mixed[1]!, perMired: mixed[2]! };
    },
  };
}

function mix(parts: readonly Float64Array[], weights: readonly number[]): Float64Array {
  const [a, b, c, d] = parts as [Float64Array, Float64Array, Float64Array, Float64Array];
  const [wa, wb, wc, wd] = weights as [number, number, number, number];
  const out = new Float64Array(a.length);
  for (let i = 0; i < out.length; i++) out[i] = wa * a[i]! + wb * b[i]! + wc * c[i]! + wd * d[i]!;
  return out;
}

/**
 * Bases of several angles, one below the other, for one fit over all of them: row k * rows + j is row j of basis k.
 * `more` may add the rows of one further basis at the end, such as a bare surface at its own angle.
 */
export function stackBases(bases: readonly FilmBasis[], more?: FilmBasis): FilmBasis {
  const first = bases[0]!;
  const all = more ? [...bases, more] : bases;
  const join = (field: (typeof FIELDS)[number]) => {
    const out = new Float64Array(all.reduce((sum, basis) => sum + basis[field].length, 0));
    let at = 0;
    for (const basis of all) {
      out.set(basis[field], at);
      at += basis[field].length;
    }
    return out;
  };
  return {
    ...first,
    count: all.reduce((sum, basis) => sum + basis.count, 0),
    rowsPerAngle: first.count,
    table: join('table'),
    perIndex: join('perIndex'),
    perMired: join('perMired'),
  };
}

/** The first row of a basis: a bare surface. */
export function bareRow(basis: FilmBasis): FilmBasis {
  const row = basis.table.length / basis.count;
  return {
    ...basis,
    count: 1,
    table: basis.table.slice(0, row),
    perIndex: basis.perIndex.slice(0, row),
    perMired: basis.perMired.slice(0, row),
  };
}
