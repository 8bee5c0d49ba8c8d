import type { Notice } from './notice.ts';
import type { PinholeCamera } from './pinholeCamera.ts';
import { type WaterView, waterView } from './waterView.ts';

/** A camera that looks straight down from `heightM` metres; "ahead" on the ground is the top of the picture. */
export function straightDownView(camera: PinholeCamera, heightM: number): WaterView {
  return waterView({ camera, heightM, pitchRad: -Math.PI / 2, rollRad: 0 });
}

/** A straight-down view from the size of one pixel on the water: height is pixel size times focal length in pixels. */
export function straightDownFromPixelSize(camera: PinholeCamera, pixelSizeM: number): WaterView {
  mustBePixelSize(pixelSizeM);
  return straightDownView(camera, pixelSizeM * camera.focalPx);
}

/** Angle and area of each pixel, row by row. */
export interface ViewFields {
  readonly incidenceRad: Float32Array;
  readonly areaM2: Float32Array;
  readonly notices: readonly Notice[];
}

/** All that a pixel size alone can tell: one area for all pixels, and the vertical for all angles, which is said. */
export function uniformFields(widthPx: number, heightPx: number, pixelSizeM: number): ViewFields {
  mustBePixelSize(pixelSizeM);
  const pixels = widthPx * heightPx;
  return {
    incidenceRad: new Float32Array(pixels),
    areaM2: new Float32Array(pixels).fill(pixelSizeM * pixelSizeM),
    notices: [
      {
        code: 'view-vertical-assumed',
        text: 'Without a focal length every pixel is taken as seen from straight above: thickness near the corners of a wide photo reads low.',
      },
    ],
  };
}

function mustBePixelSize(pixelSizeM: number): void {
  if (!(pixelSizeM > 0 && Number.isFinite(pixelSizeM))) {
    throw new RangeError('Give the size of a pixel on the water in metres, more than 0.');
  }
}
