import { orderOf } from '../chart/orders.ts';
import { type CandidateField, MOST_CANDIDATES } from '../match/candidates.ts';
import type { Calibration } from './calibrate.ts';
import { seenAt } from './seenAngles.ts';
import type { Pin } from './setup.ts';

/** A pin speaks for the places within this share of the longer side. */
const PIN_REACH = 0.008;
/** Cost of a reading that contradicts a pin: no neighbourhood outweighs it. */
const CONTRADICTION = 1000;

/**
 * Turns pins into hard evidence: readings that contradict a pin near it are priced out; "bare" adds thickness 0 where
 * no reading comes near it.
 */
export function heedPins(field: CandidateField, pins: readonly Pin[], calibration: Calibration): void {
  const { spacing } = field;
  const half = spacing >> 1;
  const seen = seenAt(calibration);
  const reach = Math.max(1, Math.round(PIN_REACH * Math.max(field.width, field.height)));
  for (const pin of pins) {
    const column = Math.round(pin.at[0] / field.spacing);
    const row = Math.round(pin.at[1] / field.spacing);
    for (let y = Math.max(0, row - reach); y <= Math.min(field.height - 1, row + reach); y++) {
      for (let x = Math.max(0, column - reach); x <= Math.min(field.width - 1, column + reach); x++) {
        if ((x - column) ** 2 + (y - row) ** 2 > reach * reach) continue;
        const { orderBoundariesNm } = seen(x * spacing + half, y * spacing + half);
        heedAt(field, y * field.width + x, pin, orderBoundariesNm);
      }
    }
  }
}

function heedAt(field: CandidateField, place: number, pin: Pin, orderBoundariesNm: readonly number[]): void {
  const at = place * MOST_CANDIDATES;
  if (pin.is === 'bare') {
    field.count[place] = 1;
    field.thicknessNm[at] = 0;
    field.sdNm[at] = 1;
    field.cost[at] = 0;
    return;
  }
  for (let k = 0; k < field.count[place]!; k++) {
    const order = orderOf(field.thicknessNm[at + k]!, orderBoundariesNm);
    if (order !== pin.order) field.cost[at + k]! += CONTRADICTION;
  }
}
