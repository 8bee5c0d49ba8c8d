import type { DrainageReadings } from './drainageLaw.ts';
import type { Profile } from './profile.ts';

/** A 90 % interval's width over one standard deviation, for a normal distribution. */
const WIDTH_90 = 3.2897072539;

/** One profile and when it was taken. */
export interface TimedProfile {
  readonly profile: Profile;
  /** Seconds since the film was made. */
  readonly timeS: number;
}

/** Where the film's top lies in the profile, and how large a pixel is on the film. */
export interface ProfileScale {
  readonly topPx: number;
  readonly metresPerPixel: number;
}

/**
 * Readings for a drainage law from profiles: places below the film's top that have a thickness of more than 0 and an
 * interval. Readings of one profile share errors (camera fit, index), so fitted standard deviations are on the small
 * side where one profile has many places.
 * @throws RangeError where the pixel size is not positive
 */
export function drainageReadings(
  profiles: readonly TimedProfile[],
  scale: ProfileScale,
): Required<DrainageReadings> {
  if (!(scale.metresPerPixel > 0)) {
    throw new RangeError(
      'Give the size of a pixel on the film in metres, more than 0: mark a known length in the frame.',
    );
  }
  const readings = profiles.flatMap(({ profile, timeS }) =>
    Array.from(profile.placePx, (placePx, i) => ({
      timeS,
      heightM: (placePx - scale.topPx) * scale.metresPerPixel,
      thicknessNm: profile.thicknessNm[i]!,
      sdNm: (profile.highNm[i]! - profile.lowNm[i]!) / WIDTH_90,
    })).filter(({ heightM, thicknessNm, sdNm }) => heightM > 0 && thicknessNm > 0 && sdNm > 0),
  );
  return {
    timeS: Float64Array.from(readings, ({ timeS }) => timeS),
    heightM: Float64Array.from(readings, ({ heightM }) => heightM),
    thicknessNm: Float64Array.from(readings, ({ thicknessNm }) => thicknessNm),
    sdNm: Float64Array.from(readings, ({ sdNm }) => sdNm),
  };
}
