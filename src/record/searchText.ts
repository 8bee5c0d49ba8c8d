import { timeWords } from './inWords.ts';
import type { Observation } from './observation.ts';

/** What a person would look for an observation by, in one line, without capitals and accents. */
export function searchText(observation: Observation): string {
  const { observer, substance, time, setup, photo, toldTo } = observation;
  return plain(
    [
      observation.title,
      observation.placeName,
      observation.remarks,
      ...Object.values(observer),
      substance?.name,
      substance?.howKnown,
      time && timeWords(time),
      time?.utc ?? time?.recorded,
      typeof setup?.film === 'string' ? spaced(setup.film) : undefined,
      photo?.metadata.fileName,
      ...toldTo.flatMap(({ who, reference }) => [who, reference]),
    ]
      .filter((part) => typeof part === 'string')
      .join(' '),
  );
}

/** Whether every word of the query occurs; an empty query finds all. */
export function isFound(observation: Observation, query: string): boolean {
  const text = searchText(observation);
  return plain(query)
    .split(/\s+/)
    .every((word) => text.includes(word));
}

function plain(text: string): string {
  return text.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase();
}

/** "lightCrude" as "light Crude". */
function spaced(name: string): string {
  return name.replace(/([a-z])([A-Z])/g, '$1 $2');
}
