import type { Probe } from '../../engine/contract.ts';

const WIDTH = 354;
const HEIGHT = 72;
/** Room above the curves for the numbers of the orders. */
const HEAD = 16;
/** Least width of the interval's band, so that a sharp reading can still be seen. */
const LEAST_BAND = 3;

/** Outline of a density over thickness, its own peak at full height. */
function pathOf(
  thicknessNm: Float32Array,
  density: Float32Array,
  endNm: number,
  toX: (nm: number) => number,
): string {
  const top = density.reduce((most, value) => Math.max(most, value), 1e-12);
  let path = `M0 ${HEIGHT}`;
  let lastX = 0;
  for (let k = 0; k < density.length; k++) {
    const nm = thicknessNm[k] ?? 0;
    if (nm > endNm) break;
    lastX = toX(nm);
    path += `L${lastX.toFixed(1)} ${(HEIGHT - (HEIGHT - HEAD) * ((density[k] ?? 0) / top)).toFixed(1)}`;
  }
  return `${path}L${lastX.toFixed(1)} ${HEIGHT}`;
}

/** How likely each thickness is: by the pixel's own colour (dashed line) and with its neighbours (filled), orders marked. */
export function PosteriorCurve({ probe, endNm }: { readonly probe: Probe; readonly endNm: number }) {
  const { thicknessNm, posteriorAlone, posteriorWithNeighbours, orderBoundariesNm } = probe;
  const toX = (nm: number) => (nm / endNm) * WIDTH;
  const starts = [0, ...orderBoundariesNm.filter((nm) => nm < endNm)];
  const hasInterval = Number.isFinite(probe.mapLowNm) && Number.isFinite(probe.mapHighNm);
  const bandWidth = Math.max(LEAST_BAND, toX(probe.mapHighNm) - toX(probe.mapLowNm));
  return (
    <svg
      class="curve"
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      preserveAspectRatio="none"
      role="img"
      aria-label="How likely each thickness is: dashed by the colour alone, filled with the neighbours; dotted lines part the interference orders"
    >
      {starts.map((nm, i) => {
        const end = starts[i + 1] ?? endNm;
        return (
          <g key={nm}>
            {i > 0 ? <line class="order" x1={toX(nm)} x2={toX(nm)} y1="2" y2={HEIGHT} /> : null}
            {toX(end) - toX(nm) > 18 ? (
              <text x={toX((nm + end) / 2)} y="11">
                {i + 1}
              </text>
            ) : null}
          </g>
        );
      })}
      {hasInterval ? (
        <rect
          class="band"
          x={toX((probe.mapLowNm + probe.mapHighNm) / 2) - bandWidth / 2}
          y={HEAD}
          width={bandWidth}
          height={HEIGHT - HEAD}
        />
      ) : null}
      <path class="with" d={pathOf(thicknessNm, posteriorWithNeighbours, endNm, toX)} />
      <path class="alone" d={pathOf(thicknessNm, posteriorAlone, endNm, toX)} />
    </svg>
  );
}
