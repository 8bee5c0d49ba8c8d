/**
 * EXIF date, sub-seconds and offset (CIPA DC-008-2019, 4.6.5.G) to ISO 8601. Without an offset in the file the text
 * carries none: a wall-clock time of unknown zone is never passed off as UTC. Undefined where the date is blank or
 * impossible.
 */
export function isoTime(
  date: string,
  offset: string | undefined,
  subSeconds: string | undefined,
): { text: string; hasOffset: boolean } | undefined {
  const parts = /^(\d{4})[:-](\d{2})[:-](\d{2})[ T](\d{2}):(\d{2}):(\d{2})/.exec(date.trim());
  if (!parts) return undefined;
  const [year, month, day, hour, minute, second] = parts.slice(1).map(Number) as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  if (year < 1826 || month < 1 || month > 12 || day < 1 || day > daysIn(year, month)) return undefined;
  if (hour > 23 || minute > 59 || second > 60) return undefined;
  const fraction = /^\d{1,9}$/.exec(subSeconds?.trim() ?? '')?.[0];
  const zone = isoOffset(offset);
  const text = `${parts[1]}-${parts[2]}-${parts[3]}T${parts[4]}:${parts[5]}:${parts[6]}`;
  return { text: `${text}${fraction ? `.${fraction}` : ''}${zone ?? ''}`, hasOffset: zone !== undefined };
}

function isoOffset(offset: string | undefined): string | undefined {
  const text = offset?.trim() ?? '';
  if (text === 'Z') return 'Z';
  const parts = /^([+-])(\d{2}):(\d{2})$/.exec(text);
  // No place on earth is further than 14 hours from UTC.
  if (!parts || Number(parts[2]) > 14 || Number(parts[3]) > 59) return undefined;
  return text;
}

function daysIn(year: number, month: number): number {
  if (month === 2) return (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0 ? 29 : 28;
  return [4, 6, 9, 11].includes(month) ? 30 : 31;
}
