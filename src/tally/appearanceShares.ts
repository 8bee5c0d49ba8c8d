import { PIXEL_STATUS } from '../match/types.ts';
import type { Notice } from '../view/notice.ts';
import { APPEARANCES, type AppearanceCode, type AppearanceShares } from './appearanceCode.ts';
import { type FilmRegion, mustFit } from './filmRegion.ts';

/** Film thinner than this is hardly seen and has no appearance code, micrometres. */
export const LEAST_VISIBLE_UM = 0.04;

export interface MappedShares {
  /** Null where no film is thick enough to have a code. */
  readonly shares: AppearanceShares | null;
  /** Area that the shares stand for: oiled and thick enough to have a code. */
  readonly codedM2: number;
  /** Film under 0.04 µm: it has no code, and the code's arithmetic leaves it out. */
  readonly belowM2: number;
  /** Film past the resolvable range, counted in `atLeastCode`. */
  readonly atLeastM2: number;
  readonly notices: readonly Notice[];
}

/**
 * Shares of codes 1 to 3 by area from the thickness map. Codes 4 and 5 are never claimed from interference colours: they
 * are the observer's call (`withObserverShares`). Film past the resolvable range has no colour left; by thickness it is
 * late Rainbow or Metallic, by look a grey mirror. It is counted as `atLeastCode`, Rainbow unless the observer saw a mirror.
 */
export function sharesFromMap(film: FilmRegion, atLeastCode: 2 | 3 = 2): MappedShares {
  mustFit(film);
  const { map, areaM2, region } = film;
  const { status, thicknessNm, lowNm } = map;
  const limitsNm = [LEAST_VISIBLE_UM, ...APPEARANCES.slice(1, 3).map(({ minUm }) => minUm)].map(
    (um) => 1000 * um,
  );
  const byCode = [0, 0, 0, 0, 0];
  let belowM2 = 0;
  let atLeastM2 = 0;
  for (let i = 0; i < status.length; i++) {
    const area = areaM2[i]!;
    if (!(area > 0) || region?.[i] === 0) {
      continue;
    }
    const code = status[i]!;
    if (code === PIXEL_STATUS.atLeast) {
      const known = lowNm[i]! >= limitsNm[2]! ? 3 : atLeastCode;
      byCode[known - 1]! += area;
      atLeastM2 += area;
    } else if (code === PIXEL_STATUS.measured || code === PIXEL_STATUS.ambiguous) {
      const thickness = thicknessNm[i]!;
      if (thickness < limitsNm[0]!) {
        belowM2 += area;
      } else {
        byCode[thickness < limitsNm[1]! ? 0 : thickness < limitsNm[2]! ? 1 : 2]! += area;
      }
    }
  }
  const codedM2 = byCode.reduce((sum, area) => sum + area, 0);
  const notices: Notice[] = [];
  if (belowM2 > 0) {
    notices.push({
      code: 'code-below',
      text: `${percent(belowM2 / (belowM2 + codedM2))} of the film is under 0.04 µm and has no appearance code: the code’s volumes leave it out.`,
    });
  }
  if (atLeastM2 > 0) {
    notices.push({
      code: 'code-open',
      text: `${percent(atLeastM2 / codedM2)} of the coded area is past what colour can tell and is counted as ${APPEARANCES[atLeastCode - 1]!.name}: call it Metallic, or true oil colour, where that is what you saw.`,
    });
  }
  return {
    shares: codedM2 > 0 ? (byCode.map((area) => area / codedM2) as unknown as AppearanceShares) : null,
    codedM2,
    belowM2,
    atLeastM2,
    notices,
  };
}

/**
 * The observer's word over the map's: the codes given take the shares given, the others keep their proportions in what is
 * left (or, where the map had none of them, all of it is missing and an error says so).
 * @throws RangeError where a share is negative, the given ones exceed 100 %, or nothing is left to take the rest
 */
export function withObserverShares(
  mapped: AppearanceShares,
  given: Readonly<Partial<Record<AppearanceCode, number>>>,
): AppearanceShares {
  const isGiven = (code: AppearanceCode) => given[code] !== undefined;
  const taken = APPEARANCES.reduce((sum, { code }) => sum + (given[code] ?? 0), 0);
  if (APPEARANCES.some(({ code }) => !((given[code] ?? 0) >= 0)) || taken > 1 + 1e-9) {
    throw new RangeError('Observed shares must be 0 % or more and add to no more than 100 %.');
  }
  const rest = APPEARANCES.reduce((sum, { code }) => sum + (isGiven(code) ? 0 : mapped[code - 1]!), 0);
  const left = Math.max(0, 1 - taken);
  if (left > 1e-9 && rest === 0) {
    throw new RangeError(
      `The observed shares add to ${Math.round(1000 * taken) / 10} % and the map has no other film to make up the rest: complete them to 100 %.`,
    );
  }
  return APPEARANCES.map(({ code }) =>
    isGiven(code) ? given[code]! : left > 1e-9 ? (mapped[code - 1]! * left) / rest : 0,
  ) as unknown as AppearanceShares;
}

function percent(share: number): string {
  return share < 0.01 ? 'Under 1 %' : `${Math.round(100 * share)} %`;
}
