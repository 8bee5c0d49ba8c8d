import { describe, expect, it } from 'vitest';
import { hashText, scramble32, seededRandom } from '../../src/scene/random.ts';
import { fractalNoise } from '../../src/scene/smoothNoise.ts';

describe('seeded random numbers', () => {
  it('repeats for the same seed and differs for another', () => {
    const take = (seed: string) => {
      const random = seededRandom(seed);
      return Array.from({ length: 5 }, () => random.next());
    };
    expect(take('a')).toEqual(take('a'));
    expect(take('a')).not.toEqual(take('b'));
  });

  it('gives a part the same stream whatever was drawn before', () => {
    const one = seededRandom(7);
    one.next();
    expect(one.fork('x').next()).toBe(seededRandom(7).fork('x').next());
  });

  // Published test values: FNV-1a 32 of "" and "a" (Fowler, Noll, Vo); MurmurHash3 finaliser of 0 and 1 (from memory of
  // the reference code: fmix32(1) = 0x514e28b7).
  it('hashes as published', () => {
    expect(hashText('')).toBe(0x811c9dc5);
    expect(hashText('a')).toBe(0xe40c292c);
    expect(scramble32(0)).toBe(0);
    expect(scramble32(1)).toBe(0x514e28b7);
  });

  it('is uniform and normal in mean, variance and tails', () => {
    const random = seededRandom('moments');
    const count = 200_000;
    let [sum, squares, beyond, uniform] = [0, 0, 0, 0];
    for (let i = 0; i < count; i++) {
      const z = random.normal();
      sum += z;
      squares += z * z;
      beyond += Math.abs(z) > 1.959964 ? 1 : 0;
      uniform += random.next();
    }
    // Five standard errors each.
    expect(Math.abs(sum / count)).toBeLessThan(5 / Math.sqrt(count));
    expect(Math.abs(squares / count - 1)).toBeLessThan(5 * Math.sqrt(2 / count));
    expect(Math.abs(beyond / count - 0.05)).toBeLessThan(5 * Math.sqrt((0.05 * 0.95) / count));
    expect(Math.abs(uniform / count - 0.5)).toBeLessThan(5 / Math.sqrt(12 * count));
  });
});

describe('smooth noise', () => {
  it('is continuous, centred and bounded', () => {
    const noise = fractalNoise(11, 4);
    let sum = 0;
    let largestStep = 0;
    for (let i = 0; i < 20_000; i++) {
      const x = (i % 200) * 0.37;
      const y = Math.floor(i / 200) * 0.41;
      const value = noise(x, y);
      sum += value;
      expect(Math.abs(value)).toBeLessThan(1.5);
      largestStep = Math.max(largestStep, Math.abs(noise(x + 1e-4, y) - value));
    }
    expect(Math.abs(sum / 20_000)).toBeLessThan(0.03);
    expect(largestStep).toBeLessThan(2e-3);
  });
});
