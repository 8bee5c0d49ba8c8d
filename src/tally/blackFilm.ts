import type { Profile } from './profile.ts';

/**
 * Thickness below which a soap film looks black, nanometres: common black film is near 30 nm and Newton black film near
 * 5 (Mysels, Shinoda & Frankel 1959, Soap Films; common practice).
 */
export const BLACK_FILM_NM = 30;

/** Where black film ends, in the profile's pixels, with the places where the interval's ends cross the limit. */
export interface BlackFilmBoundary {
  readonly placePx: number;
  readonly fromPx: number;
  readonly toPx: number;
}

/**
 * The lower end of the black film at the top of a draining film: the last place down the profile, from its black start,
 * at which the film is thinner than `limitNm`, by linear interpolation. Null where the profile does not start black or
 * never leaves it. Places without an answer are passed over.
 */
export function blackFilmBoundary(profile: Profile, limitNm = BLACK_FILM_NM): BlackFilmBoundary | null {
  const placePx = crossing(profile, profile.thicknessNm, limitNm);
  if (placePx === null) {
    return null;
  }
  // The upper end of the interval leaves black first, its lower end last.
  const fromPx = crossing(profile, profile.highNm, limitNm) ?? profile.placePx[0]!;
  const toPx = crossing(profile, profile.lowNm, limitNm) ?? profile.placePx.at(-1)!;
  return { placePx, fromPx: Math.min(fromPx, placePx), toPx: Math.max(toPx, placePx) };
}

function crossing({ placePx }: Profile, values: Float64Array, limit: number): number | null {
  let last = -1;
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (Number.isNaN(value)) {
      continue;
    }
    if (value >= limit) {
      if (last < 0) {
        return null;
      }
      const share = (limit - values[last]!) / (value - values[last]!);
      return placePx[last]! + share * (placePx[i]! - placePx[last]!);
    }
    last = i;
  }
  return null;
}
