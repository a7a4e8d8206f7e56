/**
 * Seeded random numbers: xoshiro128** (Blackman & Vigna 2021) seeded by splitmix32, so that the same seed
 * gives the same stream on any machine. Only integer operations and IEEE arithmetic are used for `next`.
 */
export interface Random {
  /** Uniform on [0, 1), 53 random bits. */
  next(): number;
  /** Uniform integer on 0…bound − 1. */
  int(bound: number): number;
  /** Standard normal (Marsaglia & Bray's polar method). */
  normal(): number;
  /** Shuffles in place (Fisher–Yates) and returns the same array. */
  shuffle<T extends Int32Array | Float64Array | unknown[]>(values: T): T;
}

const rotl = (x: number, k: number): number => (x << k) | (x >>> (32 - k));

/** @param seed any finite number; its 32-bit integer part is used. */
export function createRandom(seed: number): Random {
  let mix = seed | 0;
  const splitmix = (): number => {
    mix = (mix + 0x9e3779b9) | 0;
    let z = mix ^ (mix >>> 16);
    z = Math.imul(z, 0x21f0aaad);
    z ^= z >>> 15;
    z = Math.imul(z, 0x735a2d97);
    return z ^ (z >>> 15);
  };
  let a = splitmix();
  let b = splitmix();
  let c = splitmix();
  let d = splitmix();
  let spare = NaN;
  const bits = (): number => {
    const result = Math.imul(rotl(Math.imul(b, 5), 7), 9) >>> 0;
    const t = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= t;
    d = rotl(d, 11);
    return result;
  };
  const random: Random = {
    next: () => ((bits() >>> 5) * 67108864 + (bits() >>> 6)) / 9007199254740992,
    int: (bound) => Math.floor(random.next() * bound),
    normal: () => {
      if (!Number.isNaN(spare)) {
        const value = spare;
        spare = NaN;
        return value;
      }
      for (;;) {
        const u = 2 * random.next() - 1;
        const v = 2 * random.next() - 1;
        const s = u * u + v * v;
        if (s > 0 && s < 1) {
          const scale = Math.sqrt((-2 * Math.log(s)) / s);
          spare = v * scale;
          return u * scale;
        }
      }
    },
    shuffle: (values) => {
      for (let i = values.length - 1; i > 0; i--) {
        const j = random.int(i + 1);
        const held = values[i]!;
        values[i] = values[j]!;
        values[j] = held;
      }
      return values;
    },
  };
  return random;
}
