import { chartView } from '../chart/chartView.ts';
import type { ChartView } from './contract.ts';
import { prepareScene } from './prepareScene.ts';
import type { Setup } from './setup.ts';

/** The chart of a set-up, for eyes (CIE 1931) or a typical phone. @throws SetupError */
export function chartFor(setup: Setup, maxThicknessNm: number): ChartView {
  const { scene, light } = prepareScene(setup);
  return chartView({
    stack: scene.stack,
    light,
    observer: setup.camera === undefined || setup.camera === 'cie1931' ? 'cie1931' : 'phone',
    incidenceRad: scene.incidenceRad,
    blur: scene.blur,
    maxThicknessNm,
  });
}
