import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import sharp from 'sharp';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { KeptCamera } from '../../src/engine/keptCamera.ts';
import { SCENES } from '../../src/scene/catalogue.ts';
import { CONDITIONS } from '../../src/scene/conditions.ts';
import { seededRandom } from '../../src/scene/random.ts';
import { sceneCamera } from '../../src/scene/sceneCamera.ts';
import { CORNERS, targetPhoto } from '../engine/targetPhoto.ts';

let folder: string;
const run = (script: string, ...args: string[]) =>
  spawnSync('npm', ['run', '--silent', script, '--', ...args], { encoding: 'utf8' });
const at = (name: string) => join(folder, name);
const json = (name: string): unknown => JSON.parse(readFileSync(at(name), 'utf8'));

async function write(name: string, codes: Uint8Array, width: number, height: number): Promise<void> {
  await sharp(Buffer.from(codes), { raw: { width, height, channels: 3 } })
    .withExif({ IFD0: { Make: 'Kestrel', Model: 'Kestrel 4' } })
    .jpeg({ quality: 90, chromaSubsampling: '4:2:0' })
    .toFile(at(name));
}

beforeAll(async () => {
  folder = mkdtempSync(join(tmpdir(), 'tintfathom-camera-'));
  for (const [name, seed] of [
    ['first.jpg', 'cli first'],
    ['next.jpg', 'cli next'],
  ] as const) {
    const scene = SCENES['soap-draining']({
      width: 320,
      height: 240,
      seed,
      phone: 'cli',
      conditions: CONDITIONS.stated,
      ...(name === 'next.jpg' ? { spanNm: [80, 250] as const } : {}),
    });
    await write(name, scene.codes, 320, 240);
    writeFileSync(at(`${name}.json`), JSON.stringify(scene.setup));
  }
  const random = seededRandom('cli target');
  const coefficients = Array.from({ length: 9 }, () => random.normal());
  const pixels = await targetPhoto({
    camera: sceneCamera(coefficients, 6500, random.fork('camera')),
    tone: { shape: 'sigmoid', strength: 0.15 },
    seed: 'cli',
    gains: [1, 1, 1],
  });
  await write('target.jpg', pixels.codes as Uint8Array, pixels.width, pixels.height);
}, 120_000);

afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe('cameras on the command line', () => {
  it('estimate writes the camera, and takes it for the next photo', () => {
    const first = run('estimate', at('first.jpg'), '--setup', at('first.jpg.json'), '--out', at('one'));
    expect(first.stderr).toBe('');
    expect(first.stdout).toMatch(/camera\.json keeps this camera/);
    const kept = json('one/camera.json') as KeptCamera;
    expect(kept).toMatchObject({
      name: 'Kestrel 4',
      from: 'film',
      device: { make: 'Kestrel', model: 'Kestrel 4' },
    });
    writeFileSync(
      at('next.json'),
      JSON.stringify({ ...(json('next.jpg.json') as object), camera: { fit: true, kept } }),
    );
    const next = run('estimate', at('next.jpg'), '--setup', at('next.json'), '--out', at('two'));
    expect(next.stderr).toBe('');
    expect(json('two/summary.json')).toMatchObject({
      fit: { advice: expect.stringContaining('read with the kept camera “Kestrel 4”') },
    });
  }, 120_000);

  it('leaves no camera of an earlier run where the film tells none', () => {
    expect(existsSync(at('one/camera.json'))).toBe(true);
    const setup = { ...(json('first.jpg.json') as object), camera: { fit: false } };
    writeFileSync(at('fixed.json'), JSON.stringify(setup));
    expect(run('estimate', at('first.jpg'), '--setup', at('fixed.json'), '--out', at('one')).status).toBe(0);
    expect(existsSync(at('one/camera.json'))).toBe(false);
  }, 120_000);

  it('camera measures a colour target, and what it writes passes as camera.kept', () => {
    const corners = CORNERS.map((place) => place.join(',')).join(' ');
    const done = run(
      'camera',
      at('target.jpg'),
      '--corners',
      corners,
      '--out',
      at('camera.json'),
      '--name',
      'by target',
    );
    expect(done.stderr).toBe('');
    expect(done.stdout).toMatch(/24 patches agree/);
    const kept = json('camera.json') as KeptCamera;
    expect(kept).toMatchObject({ name: 'by target', from: 'target', determined: 'well' });
    expect(Math.abs(kept.mean[9]! - 0.15)).toBeLessThan(0.15);
    writeFileSync(
      at('by-target.json'),
      JSON.stringify({ ...(json('next.jpg.json') as object), camera: { fit: true, kept } }),
    );
    const next = run('estimate', at('next.jpg'), '--setup', at('by-target.json'), '--out', at('three'));
    expect(next.stderr).toBe('');
  }, 120_000);

  it.each([
    ['corners that are none', ['--corners', '1,2 3,4'], /four places/],
    [
      'a light that is none',
      ['--corners', '62,51 419,74 402,301 48,289', '--illuminant', 'moon'],
      /illuminant/,
    ],
    ['corners elsewhere', ['--corners', '70,60 240,66 240,180 70,170'], /24-patch target/],
    ['an unknown option', ['--corner', '1'], /--corner/],
  ])('camera refuses %s with one line', (_, args, expected) => {
    const done = run('camera', at('target.jpg'), ...args, '--out', at('none.json'));
    expect(done.status).toBe(2);
    expect(done.stderr.trim().split('\n')).toHaveLength(1);
    expect(done.stderr).toMatch(expected);
    expect(existsSync(at('none.json'))).toBe(false);
  });
});
