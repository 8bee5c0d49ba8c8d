import type { Probe } from '../../engine/contract.ts';

const WIDTH = 354;
const HEIGHT = 84;
const BASE = 64;

/** Path of a density, scaled so that the higher of the two curves fills the height. */
function pathOf(
  thicknessNm: Float32Array,
  density: Float32Array,
  top: number,
  toX: (nm: number) => number,
): string {
  let path = `M${toX(thicknessNm[0] ?? 0).toFixed(1)} ${BASE}`;
  for (let k = 0; k < density.length; k++) {
    const y = BASE - (BASE - 6) * Math.min(1, (density[k] ?? 0) / top);
    path += ` L${toX(thicknessNm[k] ?? 0).toFixed(1)} ${y.toFixed(1)}`;
  }
  return `${path} L${WIDTH} ${BASE}`;
}

/** How likely each thickness is: by the pixel's own colour (line) and with its neighbours (filled), orders marked. */
export function PosteriorCurve({ probe }: { readonly probe: Probe }) {
  const { thicknessNm, posteriorAlone, posteriorWithNeighbours, orderBoundariesNm } = probe;
  const last = thicknessNm[thicknessNm.length - 1] ?? 1;
  const toX = (nm: number) => (nm / last) * WIDTH;
  const top = Math.max(1e-9, ...posteriorAlone);
  const topWith = Math.max(1e-9, ...posteriorWithNeighbours);
  const ticks = [0, 0.25, 0.5, 0.75, 1].map((share) => Math.round((share * last) / 50) * 50);
  return (
    <svg
      class="curve"
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      role="img"
      aria-label="How likely each thickness is, by colour alone and with the neighbours"
    >
      {orderBoundariesNm
        .filter((d) => d < last)
        .map((d, i) => (
          <g key={d}>
            <line x1={toX(d)} x2={toX(d)} y1={4} y2={BASE} stroke="var(--line)" stroke-dasharray="2 4" />
            <text x={toX(d) - 4} y={12} text-anchor="end" font-size="11" fill="var(--quiet)">
              {i + 1}
            </text>
          </g>
        ))}
      <path
        d={pathOf(thicknessNm, posteriorWithNeighbours, topWith, toX)}
        fill="var(--accent)"
        fill-opacity="0.35"
      />
      <path
        d={pathOf(thicknessNm, posteriorAlone, top, toX)}
        fill="none"
        stroke="var(--accent)"
        stroke-width="2"
      />
      <line x1="0" x2={WIDTH} y1={BASE} y2={BASE} stroke="var(--line)" />
      {ticks.map((nm, i) => (
        <text
          key={nm}
          x={toX(nm)}
          y={HEIGHT - 4}
          font-size="11"
          fill="var(--quiet)"
          text-anchor={i === 0 ? 'start' : i === 4 ? 'end' : 'middle'}
        >
          {i === 4 ? `${nm} nm` : nm}
        </text>
      ))}
    </svg>
  );
}
