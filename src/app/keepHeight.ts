/** The height last typed: people come back to the same quay. */
const HEIGHT_KEY = 'tintfathom.heightM';

export function keepHeightM(heightM: number): void {
  try {
    localStorage.setItem(HEIGHT_KEY, String(heightM));
  } catch {
    // Only the convenience is lost.
  }
}

export function keptHeightM(): number | null {
  try {
    const heightM = Number(localStorage.getItem(HEIGHT_KEY) ?? Number.NaN);
    return heightM > 0 ? heightM : null;
  } catch {
    return null;
  }
}
