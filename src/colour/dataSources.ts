/** Where the figures under `data/` come from; the about page names them. */
export const DATA_SOURCES: readonly {
  readonly title: string;
  readonly source: string;
  readonly licence: string;
}[] = [
  {
    title:
      'CIE 1931 and 1964 colour-matching functions, daylight components, illuminants D50, D65, FL and LED',
    source: 'International Commission on Illumination, CIE 15:2018; as printed in colour-science/colour',
    licence: 'BSD-3-Clause, Copyright 2013 Colour Developers',
  },
  {
    title: 'Family of camera sensitivities: mean and principal components',
    source: 'derived from rawtoaces-data, Academy Software Foundation; after Jiang, Liu, Gu, Susstrunk 2013',
    licence: 'Apache-2.0',
  },
];
