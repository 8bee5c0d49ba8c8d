/**
 * Plain semi-global matching with a truncated-linear smoothness over a full label grid, four paths (Hirschmueller
 * 2008): what `resolveOrders` is compared with. The distance transform makes each step linear in the labels.
 * @param cost places x labels
 * @returns label of each place
 */
export function plainSemiGlobal(
  width: number,
  height: number,
  labels: number,
  cost: Float32Array,
  perLabel = 0.4,
  edge = 12,
): Uint16Array {
  const total = new Float32Array(width * height * labels);
  const paths = [
    [1, 0],
    [-1, 0],
    [0, 1],
    [0, -1],
  ] as const;
  const message = new Float32Array(width * height * labels);
  const smooth = new Float32Array(labels);
  for (const [dx, dy] of paths) {
    for (let n = 0; n < width * height; n++) {
      const row = Math.floor(n / width);
      const column = n % width;
      const y = dy < 0 ? height - 1 - row : row;
      const x = dx < 0 ? width - 1 - column : column;
      const i = (y * width + x) * labels;
      const inside = x - dx >= 0 && x - dx < width && y - dy >= 0 && y - dy < height;
      const from = ((y - dy) * width + x - dx) * labels;
      let least = 0;
      if (inside) {
        least = Number.POSITIVE_INFINITY;
        for (let k = 0; k < labels; k++) if (message[from + k]! < least) least = message[from + k]!;
        for (let k = 0; k < labels; k++) smooth[k] = Math.min(message[from + k]! - least, edge);
        for (let k = 1; k < labels; k++) smooth[k] = Math.min(smooth[k]!, smooth[k - 1]! + perLabel);
        for (let k = labels - 2; k >= 0; k--) smooth[k] = Math.min(smooth[k]!, smooth[k + 1]! + perLabel);
      } else smooth.fill(0);
      for (let k = 0; k < labels; k++) {
        message[i + k] = cost[i + k]! + smooth[k]!;
        total[i + k]! += message[i + k]!;
      }
    }
  }
  const out = new Uint16Array(width * height);
  for (let i = 0; i < width * height; i++) {
    let best = Number.POSITIVE_INFINITY;
    for (let k = 0; k < labels; k++) {
      if (total[i * labels + k]! >= best) continue;
      best = total[i * labels + k]!;
      out[i] = k;
    }
  }
  return out;
}
