import { execFileSync, spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { SCENES } from '../../src/scene/catalogue.ts';
import { CONDITIONS } from '../../src/scene/conditions.ts';
import type { Scene } from '../../src/scene/types.ts';

const WIDTH = 320;
const HEIGHT = 240;
let folder: string;
let scene: Scene;

const estimate = (...args: string[]) =>
  spawnSync('npm', ['run', '--silent', 'estimate', '--', ...args], { encoding: 'utf8' });

/** Pixel values of a TIFF as GDAL reads them. */
function readByGdal(path: string): Float32Array {
  const raw = `${path}.raw`;
  execFileSync('gdal_translate', ['-q', '-of', 'ENVI', '-ot', 'Float32', path, raw]);
  const bytes = readFileSync(raw);
  return new Float32Array(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length));
}

async function writePhoto(name: string, picture: Scene): Promise<string> {
  const path = join(folder, name);
  await sharp(Buffer.from(picture.codes), {
    raw: { width: picture.width, height: picture.height, channels: 3 },
  })
    .jpeg({ quality: 90, chromaSubsampling: '4:2:0' })
    .toFile(path);
  return path;
}

function writeSetup(name: string, setup: unknown): string {
  const path = join(folder, name);
  writeFileSync(path, typeof setup === 'string' ? setup : JSON.stringify(setup));
  return path;
}

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tintfathom-cli-'));
  scene = SCENES['oil-sheen']({ width: WIDTH, height: HEIGHT, seed: 2, conditions: CONDITIONS.stated });
  await writePhoto('sheen.jpg', scene);
});

afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe('npm run estimate', () => {
  it('writes files that GDAL and libtiff read, with thickness near the truth', () => {
    const out = join(folder, 'out');
    const run = estimate(
      join(folder, 'sheen.jpg'),
      '--setup',
      writeSetup('sheen.json', scene.setup),
      '--out',
      out,
    );
    expect(run.stderr).toBe('');
    expect(run.status).toBe(0);
    for (const name of [
      'thickness_nm.tif',
      'low_nm.tif',
      'high_nm.tif',
      'order.tif',
      'map.png',
      'summary.json',
    ]) {
      expect(existsSync(join(out, name)), name).toBe(true);
    }
    const info = execFileSync('tiffinfo', [join(out, 'thickness_nm.tif')], {
      encoding: 'utf8',
      stdio: ['ignore', 'pipe', 'ignore'],
    });
    expect(info).toContain(`Image Width: ${WIDTH} Image Length: ${HEIGHT}`);
    expect(info).toContain('Bits/Sample: 32');
    expect(info).toContain('IEEE floating point');
    const thickness = readByGdal(join(out, 'thickness_nm.tif'));
    const low = readByGdal(join(out, 'low_nm.tif'));
    const high = readByGdal(join(out, 'high_nm.tif'));
    expect(thickness).toHaveLength(WIDTH * HEIGHT);
    const errors: number[] = [];
    let bareRight = 0;
    let bare = 0;
    for (let i = 0; i < thickness.length; i++) {
      const truth = scene.thicknessNm[i]!;
      if (!Number.isNaN(thickness[i]!)) {
        expect(low[i]!).toBeLessThanOrEqual(thickness[i]!);
        expect(high[i]!).toBeGreaterThanOrEqual(thickness[i]!);
      }
      if (truth === 0) {
        bare++;
        if (thickness[i] === 0) bareRight++;
      } else if (truth > 0)
        errors.push(Number.isNaN(thickness[i]!) ? Number.POSITIVE_INFINITY : Math.abs(thickness[i]! - truth));
    }
    errors.sort((a, b) => a - b);
    expect(errors[errors.length >> 1]!).toBeLessThan(3);
    expect(bareRight / bare).toBeGreaterThan(0.95);
    const summary = JSON.parse(readFileSync(join(out, 'summary.json'), 'utf8')) as Record<string, unknown>;
    expect(summary).toMatchObject({ calibrated: true, tintfathom: expect.stringMatching(/^\d+\.\d+\.\d+$/) });
    expect(summary.counts).toMatchObject({ total: WIDTH * HEIGHT });
    for (const key of ['quantilesNm', 'resolvableNm', 'notices', 'timingsMs', 'fit', 'ambiguousShare'])
      expect(summary).toHaveProperty(key);
  });

  it.each([
    ['an unknown key', { film: 'soap', colour: 1 }, /there is no key "colour"/],
    ['an unknown film', { film: 'sope' }, /"film"/],
    ['a light out of range', { film: 'soap', light: { daylightK: 900 } }, /light/],
    [
      'two measured layers',
      {
        film: {
          ambient: 'air',
          layers: [{ material: 'soapSolution' }, { material: 'diesel' }],
          substrate: 'air',
        },
      },
      /exactly one layer/,
    ],
    [
      'a patch off the photo',
      { film: 'diesel', references: { clean: [5000, 5000, 40, 40] } },
      /covers no pixel/,
    ],
    ['JSON that is none', '{"film": "soap"', /not JSON/],
  ])('refuses %s with one line', (_, setup, expected) => {
    const run = estimate(
      join(folder, 'sheen.jpg'),
      '--setup',
      writeSetup('bad.json', setup),
      '--out',
      join(folder, 'bad'),
    );
    expect(run.status).toBe(2);
    expect(run.stderr.trim().split('\n')).toHaveLength(1);
    expect(run.stderr).toMatch(expected);
  });

  it('refuses a missing photo, a corrupt one and a missing folder name', () => {
    const setup = writeSetup('good.json', scene.setup);
    writeFileSync(
      join(folder, 'broken.jpg'),
      Buffer.concat([readFileSync(join(folder, 'sheen.jpg')).subarray(0, 900)]),
    );
    for (const args of [
      [join(folder, 'none.jpg'), '--setup', setup, '--out', join(folder, 'x')],
      [join(folder, 'broken.jpg'), '--setup', setup, '--out', join(folder, 'x')],
      [join(folder, 'sheen.jpg'), '--setup', setup],
    ]) {
      const run = estimate(...args);
      expect(run.status).toBe(2);
      expect(run.stderr.trim().split('\n')).toHaveLength(1);
    }
  });

  it('refuses a clipped card and says what to take instead', async () => {
    const white: Scene = {
      ...scene,
      codes: scene.codes.map((v, i) => (Math.floor(i / 3) % WIDTH < 60 ? 255 : v)),
    };
    const path = await writePhoto('clipped.jpg', white);
    const run = estimate(
      path,
      '--setup',
      writeSetup('card.json', { film: 'diesel', references: { white: [8, 8, 40, 40] } }),
      '--out',
      join(folder, 'x'),
    );
    expect(run.status).toBe(2);
    expect(run.stderr).toMatch(/dark grey card/);
  });
});
