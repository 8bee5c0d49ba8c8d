import { horizonDipRad, type Place, tiltFromHorizon } from './horizon.ts';
import { type PinholeCamera, pinholeCamera } from './pinholeCamera.ts';
import { type WaterView, waterView } from './waterView.ts';

/** One view among those that what is known allows; for Monte Carlo trials. */
export type PoseDraw = (random: { readonly normal: () => number }) => WaterView;

/**
 * Views about one whose tilt was typed or came from a sensor: standard deviations of height and focal length as shares
 * (drawn log-normal, so they stay positive), of pitch and roll in radians.
 */
export function posesFromTilt(
  view: WaterView,
  sd: {
    readonly heightShare: number;
    readonly focalShare: number;
    readonly pitchRad: number;
    readonly rollRad: number;
  },
): PoseDraw {
  return (random) => {
    const heightM = view.heightM * Math.exp(sd.heightShare * random.normal());
    const pitch = view.pitchRad + sd.pitchRad * random.normal();
    return waterView({
      camera: scaledFocal(view.camera, sd.focalShare * random.normal()),
      heightM,
      pitchRad: Math.max(-Math.PI / 2, Math.min(Math.PI / 2, pitch)),
      rollRad: view.rollRad + sd.rollRad * random.normal(),
    });
  };
}

/**
 * Views whose tilt follows from two places on the horizon, each astray by `tapPx`. Here a wrong focal length moves the
 * tilt with it, and most of its effect on areas cancels: that is why the horizon is worth marking.
 */
export function posesFromHorizon(
  view: WaterView,
  horizon: readonly [Place, Place],
  sd: { readonly heightShare: number; readonly focalShare: number; readonly tapPx: number },
): PoseDraw {
  const [a, b] = horizon;
  const apartPx = Math.hypot(b[0] - a[0], b[1] - a[1]);
  const acrossX = -(b[1] - a[1]) / apartPx;
  const acrossY = (b[0] - a[0]) / apartPx;
  return (random) => {
    const heightM = view.heightM * Math.exp(sd.heightShare * random.normal());
    const camera = scaledFocal(view.camera, sd.focalShare * random.normal());
    const one = sd.tapPx * random.normal();
    const other = sd.tapPx * random.normal();
    const tilt = tiltFromHorizon(
      camera,
      [a[0] + acrossX * one, a[1] + acrossY * one],
      [b[0] + acrossX * other, b[1] + acrossY * other],
      horizonDipRad(heightM),
    );
    return waterView({ camera, heightM, ...tilt });
  };
}

function scaledFocal(camera: PinholeCamera, logShare: number): PinholeCamera {
  return pinholeCamera(camera.widthPx, camera.heightPx, camera.focalPx * Math.exp(logShare), camera.radial);
}
