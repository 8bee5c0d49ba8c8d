import { readFileSync } from 'node:fs';
import Color from 'colorjs.io';
import { describe, expect, it } from 'vitest';

/** Contrast as WCAG 2.1 defines it, counted by colorjs.io; level AAA asks 7:1 of text, AA 4.5:1. */
const css = readFileSync('src/app/tokens.css', 'utf8');

function tokensOf(selector: string): Map<string, string> {
  const start = css.indexOf(`${selector} {`);
  expect(start, selector).toBeGreaterThanOrEqual(0);
  const block = css.slice(start, css.indexOf('}', start));
  return new Map(
    [...block.matchAll(/(--[\w-]+):\s*(#[0-9a-f]{6});/g)].map(([, name, value]) => [name!, value!]),
  );
}

const dark = tokensOf(':root');
const sunlight = new Map([...dark, ...tokensOf(':root[data-theme="sunlight"]')]);
const contrast = (theme: Map<string, string>, ink: string, ground: string) =>
  new Color(theme.get(ink) ?? '').contrast(new Color(theme.get(ground) ?? ''), 'WCAG21');

const INKS = ['--text', '--quiet', '--warn', '--accent'];
const GROUNDS = ['--ground', '--raised', '--control'];

describe.each([
  ['dark', dark, 4.5],
  ['sunlight', sunlight, 7],
] as const)('text in the %s theme', (_, theme, least) => {
  it.each(INKS.flatMap((ink) => GROUNDS.map((ground) => [ink, ground] as const)))(
    '%s on %s',
    (ink, ground) => {
      expect(contrast(theme, ink, ground)).toBeGreaterThanOrEqual(least);
    },
  );

  it('on the chosen button', () => {
    expect(contrast(theme, '--on-accent', '--accent')).toBeGreaterThanOrEqual(least);
  });
});

describe('the themes', () => {
  it('are a dark one and a light one', () => {
    const luminance = (theme: Map<string, string>) => new Color(theme.get('--ground') ?? '').luminance;
    expect(luminance(dark)).toBeLessThan(0.05);
    expect(luminance(sunlight)).toBeGreaterThan(0.9);
  });
});
