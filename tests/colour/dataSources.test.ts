import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { DATA_SOURCES } from '../../src/colour/dataSources.ts';

const folder = join(import.meta.dirname, '../../src/colour/data');
const modules = readdirSync(folder).filter((name) => name.endsWith('.ts'));
const licences = DATA_SOURCES.map(({ licence }) => licence.split(',')[0]!);

test('every table of figures names its licence, and the about page is told of it', () => {
  expect(modules.length).toBeGreaterThan(0);
  for (const name of modules) {
    const header = readFileSync(join(folder, name), 'utf8').split('*/')[0]!;
    expect(
      licences.some((licence) => header.includes(licence)),
      name,
    ).toBe(true);
  }
});

test('the terms that ask to be repeated are repeated beside the figures', () => {
  const terms = readFileSync(join(folder, 'LICENSE-colour-science.txt'), 'utf8');
  expect(terms).toMatch(/^Copyright 2013 Colour Developers/);
  expect(DATA_SOURCES.some(({ licence }) => licence.includes('Copyright 2013 Colour Developers'))).toBe(true);
});
