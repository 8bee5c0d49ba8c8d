export { FILM_NAMES, filmName } from '../../record/filmWords.ts';

/** Sky in words for a colour temperature of daylight (rule of thumb; the mirrored part of the sky counts). */
export function skyWords(daylightK: number): string {
  if (daylightK < 5200) return 'low sun, warm sky';
  if (daylightK < 6000) return 'sun and cloud';
  if (daylightK < 7200) return 'overcast';
  if (daylightK < 9500) return 'thin cloud, some blue';
  return 'clear blue sky';
}

/** The angle between the line of sight and the film's normal, in words. */
export function incidenceWords(incidenceDeg: number, water: boolean): string {
  if (incidenceDeg < 8) return water ? 'Straight down' : 'Straight at the film';
  if (incidenceDeg < 25) return water ? 'Nearly straight down' : 'A little from the side';
  if (incidenceDeg < 50) return water ? 'Looking out at the water' : 'From the side';
  return 'Low along the surface';
}
