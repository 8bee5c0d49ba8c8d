import { discreteGauss } from './discreteGauss.ts';

/** Local incidence angles with weights that sum to one; the shape that the optics' blur takes. */
export interface IncidenceDistribution {
  readonly angleRad: Float64Array;
  readonly weight: Float64Array;
}

/** Slopes are summed out to this many standard deviations, at this many places each way. */
const REACH = 5;
const PLACES = 61;

/**
 * The incidence angles that a film on a rough sea offers to one line of sight: facets with Gaussian slopes, the same in
 * all directions, `slopeVariance` in all (half of it along each axis; Cox & Munk 1954), each counted by the area that it
 * turns to the viewer. Facets hidden by others are not left out, so trust it to about 70 degrees. The many angles are
 * boiled down to the `nodes` of their Gauss rule, which keeps the mean of any smooth reflectance; 7 will do.
 * With no slope, one angle.
 * @throws RangeError where the mean angle is not in 0 to pi/2, or the variance is negative
 */
export function incidenceDistribution(
  meanIncidenceRad: number,
  slopeVariance: number,
  nodes = 7,
): IncidenceDistribution {
  if (!(meanIncidenceRad >= 0 && meanIncidenceRad < Math.PI / 2)) {
    throw new RangeError('The angle of view must lie between 0 and 90 degrees from the vertical.');
  }
  if (!(slopeVariance >= 0 && Number.isFinite(slopeVariance))) {
    throw new RangeError('The mean square slope must be 0 or more.');
  }
  if (slopeVariance < 1e-10 || nodes === 1) {
    return { angleRad: Float64Array.of(meanIncidenceRad), weight: Float64Array.of(1) };
  }
  const sd = Math.sqrt(slopeVariance / 2);
  const cosine = Math.cos(meanIncidenceRad);
  const sine = Math.sin(meanIncidenceRad);
  const points = new Float64Array(PLACES * PLACES);
  const weights = new Float64Array(PLACES * PLACES);
  let at = 0;
  for (let i = 0; i < PLACES; i++) {
    const a = REACH * ((2 * i) / (PLACES - 1) - 1);
    for (let j = 0; j < PLACES; j++) {
      const b = REACH * ((2 * j) / (PLACES - 1) - 1);
      // Facet normal (-sa, -sb, 1); the viewer stands in the direction (sine, 0, cosine).
      const facing = cosine - a * sd * sine;
      points[at] = facing > 0 ? Math.acos(Math.min(1, facing / Math.sqrt(1 + sd * sd * (a * a + b * b)))) : 0;
      weights[at] = facing > 0 ? facing * Math.exp(-(a * a + b * b) / 2) : 0;
      at++;
    }
  }
  const rule = discreteGauss(points, weights, nodes);
  return { angleRad: rule.node, weight: rule.weight };
}
