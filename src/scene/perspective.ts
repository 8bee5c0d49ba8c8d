/**
 * A pinhole camera over level water, written for the renderer alone so that the reader's own geometry has something
 * to be compared with. World axes in metres: X right, Y ahead, Z up; the water is Z = 0, the camera (0, 0, heightM).
 */
export interface PinholeView {
  readonly widthPx: number;
  readonly heightPx: number;
  /** Distance of the picture plane in pixels. */
  readonly focalPx: number;
  /** Height of the lens above the water. */
  readonly heightM: number;
  /** Optical axis above the horizontal; negative looks down. */
  readonly pitchRad: number;
  /** Camera turned clockwise as seen from behind it, so the horizon tilts the other way. */
  readonly rollRad: number;
}

/** Diagonal of the 36 x 24 mm frame, to which a 35 mm equivalent focal length refers (CIPA DCG-001). */
export const FULL_FRAME_DIAGONAL_MM = Math.hypot(36, 24);

/** Focal length in pixels from its 35 mm equivalent, by the picture's diagonal. */
export function focalPxFrom35mm(focal35mm: number, widthPx: number, heightPx: number): number {
  return (focal35mm / FULL_FRAME_DIAGONAL_MM) * Math.hypot(widthPx, heightPx);
}

/** The view's axes as world vectors: a pixel (x, y) looks along focalPx * ahead + u * right - v * up. */
export interface ViewAxes {
  readonly right: readonly [number, number, number];
  readonly up: readonly [number, number, number];
  readonly ahead: readonly [number, number, number];
}

export function viewAxes(view: PinholeView): ViewAxes {
  const cp = Math.cos(view.pitchRad);
  const sp = Math.sin(view.pitchRad);
  const cr = Math.cos(view.rollRad);
  const sr = Math.sin(view.rollRad);
  return {
    ahead: [0, cp, sp],
    right: [cr, sr * sp, -sr * cp],
    up: [sr, -cr * sp, cr * cp],
  };
}

/** Writes the direction (not of unit length) in which the picture place (x, y), in pixels from the top left, looks. */
export function lookAlong(
  view: PinholeView,
  axes: ViewAxes,
  x: number,
  y: number,
  out: Float64Array | number[],
): void {
  const u = x - view.widthPx / 2;
  const v = y - view.heightPx / 2;
  for (let i = 0; i < 3; i++) {
    out[i] = view.focalPx * axes.ahead[i]! + u * axes.right[i]! - v * axes.up[i]!;
  }
}

/** Angle between the line of sight and the vertical, radians; above pi/2 for what lies above the horizon. */
export function incidenceRad(direction: ArrayLike<number>): number {
  const [dx, dy, dz] = [direction[0]!, direction[1]!, direction[2]!];
  return Math.atan2(Math.hypot(dx, dy), -dz);
}

/**
 * Water area in square metres that one pixel covers about `direction` (from `lookAlong`); NaN at and above the horizon.
 * dA = h^2 f / |dz|^3 for direction components in pixels: the projection's Jacobian, exact in the limit of small pixels.
 */
export function waterAreaM2(view: PinholeView, direction: ArrayLike<number>): number {
  const down = -direction[2]!;
  return down > 0 ? (view.heightM * view.heightM * view.focalPx) / (down * down * down) : Number.NaN;
}

/** Where the horizon of level water meets a column of the picture, in pixels from the top; it may lie off the picture. */
export function horizonAt(view: PinholeView, x: number): number {
  // dz = f ahead_z + u right_z - v up_z = 0, solved for v.
  const { ahead, right, up } = viewAxes(view);
  return view.heightPx / 2 + (view.focalPx * ahead[2] + (x - view.widthPx / 2) * right[2]) / up[2];
}
