import { applyWeights } from '../colour/applyWeights.ts';
import type { ChannelWeights } from '../colour/types.ts';
import { blurredReflectanceTable } from '../optics/blur.ts';
import type { Blur, FilmStack, Polarisation } from '../optics/types.ts';

/** What a chart is drawn for. */
export interface FilmChartRequest {
  readonly stack: FilmStack;
  readonly weights: ChannelWeights;
  readonly incidenceRad: number;
  readonly polarisation: Polarisation;
  readonly blur: Blur;
  readonly stepNm: number;
  readonly count: number;
}

/**
 * Channel values against thickness: out[3 j + c] at thickness j * stepNm, a perfect white reflector being the white of
 * the weights. The average of `blur` is taken on reflectance, before the colour step.
 */
export function filmChart(request: FilmChartRequest): Float64Array {
  const { weights, stepNm, count } = request;
  const table = blurredReflectanceTable(
    request.stack,
    {
      thicknessNm: Float64Array.from({ length: count }, (_, j) => j * stepNm),
      wavelengthNm: weights.wavelengthNm,
      incidenceRad: request.incidenceRad,
      polarisation: request.polarisation,
    },
    request.blur,
  );
  return applyWeights(weights, table);
}
