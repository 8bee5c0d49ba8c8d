import type { ChartView } from '../../engine/contract.ts';
import { writeCsv } from '../../record/csv.ts';
import { orderAt, placeInRange } from './likeColours.ts';
import { type ChartSetup, lightWords, observerWords, surfaceWords } from './setupWords.ts';

const HEADER = [
  'thickness_nm',
  'order',
  'X',
  'Y',
  'Z',
  'L_star',
  'a_star',
  'b_star',
  'linear_srgb_r',
  'linear_srgb_g',
  'linear_srgb_b',
  'srgb_r_8bit',
  'srgb_g_8bit',
  'srgb_b_8bit',
  'ciede2000_per_nm',
  'within_resolvable_range',
  'film',
  'surface',
  'light',
  'incidence_deg',
  'observer',
];

/** Digits that single-precision figures hold. */
const figure = (value: number | undefined) => (value === undefined ? null : Number(value.toPrecision(6)));

/**
 * The chart as a table, one thickness a row. The set-up stands in every row: rows that are cut out or joined with those
 * of another chart still say what they hold for.
 */
export function chartCsv(view: ChartView, setup: ChartSetup): string {
  const film = typeof setup.film === 'string' ? setup.film : JSON.stringify(setup.film);
  const fixed = [
    film,
    surfaceWords(setup),
    lightWords(setup.light),
    setup.incidenceDeg ?? 0,
    observerWords(setup.camera),
  ];
  const triple = (values: Float32Array | Uint8Array, j: number) =>
    [0, 1, 2].map((c) => figure(values[3 * j + c]));
  return writeCsv(
    HEADER,
    Array.from({ length: view.count }, (_, j) => {
      const nm = j * view.stepNm;
      return [
        nm,
        orderAt(nm, view.orderBoundariesNm),
        ...triple(view.xyz, j),
        ...triple(view.lab, j),
        ...triple(view.linearRgb, j),
        ...triple(view.displayRgb, j),
        figure(view.sensitivityPerNm[j]),
        placeInRange(view, nm) === 'within' ? 'yes' : 'no',
        ...fixed,
      ];
    }),
  );
}
