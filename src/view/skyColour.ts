export type Cloud = 'clear' | 'broken' | 'overcast';

/** What lights the film: the sky it mirrors, as a correlated colour temperature with the range worth allowing for. */
export interface SkyColour {
  readonly kelvin: number;
  readonly lowKelvin: number;
  readonly highKelvin: number;
  readonly words: string;
}

/**
 * A first guess at the colour of the sky that a film mirrors, from the sun's elevation in degrees and the cloud.
 * A rule of thumb, not a measurement: overcast is near 6500 K, clear blue sky well above 10 000 K, and a sun below about
 * 10 degrees makes the sky away from it bluer and the sky about it redder, hence the wider range. Bare water marked in the
 * photo overrides it.
 */
export function suggestSkyColour(elevationDeg: number, cloud: Cloud): SkyColour {
  const low = elevationDeg < 10;
  switch (cloud) {
    case 'overcast':
      return low
        ? { kelvin: 7000, lowKelvin: 5500, highKelvin: 10_000, words: 'grey sky, low sun' }
        : { kelvin: 6500, lowKelvin: 5800, highKelvin: 7500, words: 'grey sky' };
    case 'broken':
      return low
        ? { kelvin: 8000, lowKelvin: 5000, highKelvin: 15_000, words: 'cloud and blue sky, low sun' }
        : { kelvin: 8000, lowKelvin: 6000, highKelvin: 12_000, words: 'cloud and blue sky' };
    case 'clear':
      return low
        ? { kelvin: 12_000, lowKelvin: 5000, highKelvin: 25_000, words: 'clear sky, low sun' }
        : { kelvin: 12_000, lowKelvin: 9000, highKelvin: 25_000, words: 'clear blue sky' };
  }
}
