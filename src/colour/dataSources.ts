/** Where the figures under `data/` come from and on what terms; the about page names them. */
export const DATA_SOURCES: readonly {
  readonly title: string;
  readonly source: string;
  readonly licence: string;
}[] = [
  {
    title: 'CIE 1931 2-degree and 1964 10-degree colour-matching functions, 1 nm',
    source: 'CIE 15:2018, ISO/CIE 11664-1:2019; figures as printed in colour-science/colour',
    licence: 'BSD-3-Clause, Copyright 2013 Colour Developers',
  },
  {
    title: 'Components of daylight S0, S1, S2 and standard illuminants D50 and D65, 5 nm',
    source: 'CIE 15:2004 and 15:2018, ISO/CIE 11664-2; figures as printed in colour-science/colour',
    licence: 'BSD-3-Clause, Copyright 2013 Colour Developers',
  },
  {
    title: 'Fluorescent illuminants FL2 and FL11 and LED illuminants B1 to B5, 5 nm',
    source: 'CIE 15:2004 and 15:2018; figures as printed in colour-science/colour',
    licence: 'BSD-3-Clause, Copyright 2013 Colour Developers',
  },
  {
    title: 'Family of camera sensitivities: mean and principal components of 50 measured cameras, 5 nm',
    source:
      'Derived from rawtoaces-data, Academy Software Foundation; after Jiang, Liu, Gu and Süsstrunk 2013, WACV',
    licence: 'Apache-2.0',
  },
  {
    title: 'Reflectance of the 24 patches of a colour target, 10 nm',
    source:
      'N. Ohta 1997, The Basis of Color Reproduction Engineering; figures as printed in colour-science/colour',
    licence: 'BSD-3-Clause, Copyright 2013 Colour Developers',
  },
];
