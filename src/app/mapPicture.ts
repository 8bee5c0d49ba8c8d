import { PIXEL_STATUS, type ThicknessMap } from '../match/types.ts';

export interface MapPicture {
  readonly bitmap: ImageBitmap;
  readonly topNm: number;
  readonly ramp: Uint8Array;
}

/** Colours of orders: alternating light and dark of one ramp, so that neighbours always differ. */
const ORDER_STEPS = [0.35, 0.85, 0.5, 1, 0.6, 0.92, 0.45, 0.75];

/** Paints a map for the stage. The painter comes lazily: it brings the colour library. */
export async function mapPicture(map: ThicknessMap, view: 'thickness' | 'order'): Promise<MapPicture> {
  const { paintMap, thicknessRamp } = await import('../record/thicknessColours.ts');
  const ramp = thicknessRamp();
  const shown = view === 'thickness' ? map : asOrders(map);
  const { rgb, topNm } = view === 'thickness' ? paintMap(map) : paintMap(shown, 1);
  const pixels = new Uint8ClampedArray(4 * map.width * map.height);
  for (let i = 0, o = 0; i < rgb.length; i += 3, o += 4) {
    pixels[o] = rgb[i] ?? 0;
    pixels[o + 1] = rgb[i + 1] ?? 0;
    pixels[o + 2] = rgb[i + 2] ?? 0;
    pixels[o + 3] = opacityOf(map.status[o / 4] ?? 0);
  }
  return { bitmap: await createImageBitmap(new ImageData(pixels, map.width, map.height)), topNm, ramp };
}

/** The photo shows through where nothing was read, so that hull, quay and glint stay recognisable. */
function opacityOf(status: number): number {
  if (status === PIXEL_STATUS.outside) return 0;
  return status === PIXEL_STATUS.noFilmColour ? 150 : 255;
}

function asOrders(map: ThicknessMap): ThicknessMap {
  return {
    ...map,
    thicknessNm: Float32Array.from(map.order, (order) =>
      order === 255 || order === 0 ? Number.NaN : (ORDER_STEPS[(order - 1) % ORDER_STEPS.length] ?? 1),
    ),
  };
}
