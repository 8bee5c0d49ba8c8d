import { type CandidateField, MOST_CANDIDATES } from './candidates.ts';

/** How much neighbours are believed: a truncated-linear smoothness (edges are allowed, at a price that stops growing). */
export interface Smoothness {
  /** Cost (minus log probability) a nanometre of difference between adjacent pixels. */
  readonly perNm: number;
  /** Cost of an edge: from here on a larger difference costs little more, so that films may end. */
  readonly edge: number;
  /** What a nanometre costs beyond the edge. */
  readonly perNmBeyond: number;
  /** Share of its weight that a place's own colour keeps: places share errors of the chart and of compression. */
  readonly trust: number;
  /** A draining film: a place below that is thinner than the one above costs more. */
  readonly thickerDown: boolean;
}

export const STATED_SMOOTHNESS: Smoothness = {
  perNm: 0.1,
  edge: 12,
  perNmBeyond: 0.02,
  trust: 1,
  thickerDown: false,
};
/** How much dearer a step against the trend is. */
const AGAINST_TREND = 3;

export interface OrderSolution {
  /** Chosen candidate of each place; 255 where there is none. */
  readonly choice: Uint8Array;
  /** Cost of the best other candidate less that of the choice, per path: small means ambiguous. */
  readonly margin: Float32Array;
}

/** Directions of the eight paths. */
const PATHS: readonly (readonly [number, number])[] = [
  [1, 0],
  [-1, 0],
  [0, 1],
  [0, -1],
  [1, 1],
  [-1, -1],
  [1, -1],
  [-1, 1],
];

/**
 * Chooses one candidate a place so that neighbours agree: semi-global matching (Hirschmueller 2008) over sparse
 * candidates instead of a label grid, so its cost does not grow with the range of thickness.
 *
 * Places without candidates are bridged: the path goes on with what it last saw, so a fleck of glint does not cut it.
 * @param onShare called after each of the eight paths with the share done
 */
export function resolveOrders(
  field: CandidateField,
  options: Partial<Smoothness> = {},
  onShare: (share: number) => void = () => {},
): OrderSolution {
  const { width, height, count, cost } = field;
  const smoothness = { ...STATED_SMOOTHNESS, ...options };
  const message = new Float32Array(width * height * MOST_CANDIDATES);
  const sourceOf = new Int32Array(width * height);
  const total = new Float32Array(width * height * MOST_CANDIDATES);
  PATHS.forEach(([dx, dy], n) => {
    sweep(field, smoothness, dx, dy, total, message, sourceOf);
    onShare((n + 1) / PATHS.length);
  });
  const choice = new Uint8Array(width * height).fill(255);
  const margin = new Float32Array(width * height);
  for (let i = 0; i < width * height; i++) {
    const n = count[i]!;
    if (n === 0) continue;
    let best = Number.POSITIVE_INFINITY;
    let second = Number.POSITIVE_INFINITY;
    let chosen = 0;
    for (let k = 0; k < n; k++) {
      // Each of the paths counted the place's own cost; it belongs in the sum once.
      const c =
        total[i * MOST_CANDIDATES + k]! -
        (PATHS.length - 1) * smoothness.trust * cost[i * MOST_CANDIDATES + k]!;
      if (c < best) {
        second = best;
        best = c;
        chosen = k;
      } else if (c < second) second = c;
    }
    choice[i] = chosen;
    margin[i] = second - best;
  }
  return { choice, margin };
}

/** Adds the path costs of one direction to `total`. */
function sweep(
  field: CandidateField,
  smoothness: Smoothness,
  dx: number,
  dy: number,
  total: Float32Array,
  message: Float32Array,
  sourceOf: Int32Array,
): void {
  const { width, height, spacing, count, thicknessNm, sdNm, cost } = field;
  const K = MOST_CANDIDATES;
  const perNm = smoothness.perNm / (spacing * Math.hypot(dx, dy));
  const { edge, trust } = smoothness;
  // Each place passes on the path costs of the last place with candidates: `message` there, `sourceOf` says where.
  sourceOf.fill(-1);
  const trend = smoothness.thickerDown ? Math.sign(dy) : 0;
  const beyond = smoothness.perNmBeyond;
  const forward = dy > 0 || (dy === 0 && dx > 0);
  for (let row = 0; row < height; row++) {
    const y = dy >= 0 ? row : height - 1 - row;
    for (let column = 0; column < width; column++) {
      const x = (dx === 0 ? forward : dx > 0) ? column : width - 1 - column;
      const i = y * width + x;
      const px = x - dx;
      const py = y - dy;
      const inside = px >= 0 && py >= 0 && px < width && py < height;
      const source = inside ? sourceOf[py * width + px]! : -1;
      const n = count[i]!;
      if (n === 0) {
        sourceOf[i] = source;
        continue;
      }
      sourceOf[i] = i;
      const own = i * K;
      if (source < 0) {
        for (let k = 0; k < n; k++) {
          message[own + k] = trust * cost[own + k]!;
          total[own + k]! += trust * cost[own + k]!;
        }
        continue;
      }
      const from = source * K;
      const m = count[source]!;
      let floor = Number.POSITIVE_INFINITY;
      for (let q = 0; q < m; q++) if (message[from + q]! < floor) floor = message[from + q]!;
      for (let k = 0; k < n; k++) {
        const d = thicknessNm[own + k]!;
        const w = sdNm[own + k]!;
        let best = Number.POSITIVE_INFINITY;
        for (let q = 0; q < m; q++) {
          const step = d - thicknessNm[from + q]!;
          const gap = Math.abs(step) - (w + sdNm[from + q]!);
          let price = gap > 0 ? Math.min(perNm * gap, edge + beyond * gap) : 0;
          if (trend !== 0 && step * trend < 0) price *= AGAINST_TREND;
          const c = message[from + q]! + price;
          if (c < best) best = c;
        }
        const value = trust * cost[own + k]! + best - floor;
        message[own + k] = value;
        total[own + k]! += value;
      }
    }
  }
}
