/** A stream of reproducible random numbers. Every scene takes one; nothing in this folder calls Math.random. */
export interface Random {
  /** Uniform in [0, 1) with 32 random bits. */
  readonly next: () => number;
  /** Uniform in [low, high). */
  readonly uniform: (low: number, high: number) => number;
  /** Normal with mean 0 and standard deviation 1. */
  readonly normal: () => number;
  /** A stream of its own for the named part, so that a change in one part leaves the others as they were. */
  readonly fork: (label: string) => Random;
}

/** 32-bit FNV-1a hash (Fowler, Noll, Vo; offset basis 2166136261, prime 16777619) of the UTF-16 units of `text`. */
export function hashText(text: string): number {
  let hash = 2166136261;
  for (let i = 0; i < text.length; i++) {
    hash = Math.imul(hash ^ text.charCodeAt(i), 16777619);
  }
  return hash >>> 0;
}

/** Scrambles a 32-bit integer (finaliser of MurmurHash3, Appleby 2011). */
export function scramble32(value: number): number {
  let h = value | 0;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return (h ^ (h >>> 16)) >>> 0;
}

/**
 * A stream from a seed (any integer or text). Generator: sfc32 (Doty-Humphrey, PractRand), 96 bits of state and a
 * counter; normals by the polar method (Marsaglia & Bray 1964).
 */
export function seededRandom(seed: number | string): Random {
  const name = String(seed);
  let a = scramble32(hashText(name));
  let b = scramble32(a ^ 0x9e3779b9);
  let c = scramble32(b ^ 0x7f4a7c15);
  let counter = 1;
  let spare = Number.NaN;

  const bits = () => {
    const sum = (a + b + counter) | 0;
    counter = (counter + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = (((c << 21) | (c >>> 11)) + sum) | 0;
    return sum >>> 0;
  };
  for (let i = 0; i < 12; i++) {
    bits();
  }
  const next = () => bits() / 4294967296;
  const normal = () => {
    if (!Number.isNaN(spare)) {
      const kept = spare;
      spare = Number.NaN;
      return kept;
    }
    for (;;) {
      const u = 2 * next() - 1;
      const v = 2 * next() - 1;
      const s = u * u + v * v;
      if (s > 0 && s < 1) {
        const factor = Math.sqrt((-2 * Math.log(s)) / s);
        spare = v * factor;
        return u * factor;
      }
    }
  };
  return {
    next,
    uniform: (low, high) => low + (high - low) * next(),
    normal,
    fork: (label) => seededRandom(`${name}/${label}`),
  };
}
