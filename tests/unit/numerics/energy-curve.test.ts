import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { createRandom, energyCurve, spectrum, UnanswerableError, type LaplacianKind } from '@/numerics';
import { complete, path, planted, ring, star } from './networks';

const plain = { permutations: 0, seed: 1 };
const all = (net: Parameters<typeof spectrum>[0], laplacian: LaplacianKind = 'combinatorial') =>
  spectrum(net, { laplacian, count: 'all' });
const from = (length: number, of: (i: number) => number) => Float64Array.from({ length }, (_, i) => of(i));

function* orders(values: readonly number[]): Generator<number[]> {
  if (values.length === 0) yield [];
  for (const [at, value] of values.entries())
    for (const rest of orders(values.filter((_, other) => other !== at))) yield [value, ...rest];
}

describe('closed forms (Brouwer & Haemers 2012, section 1.4)', () => {
  it('path: an eigenvector cos(π l (j + ½) / n) is one jump from 0 to 1 at 4 sin²(π l / 2n)', () => {
    const n = 12;
    const net = path(n);
    const basis = all(net);
    for (const l of [1, 4, 11]) {
      const signal = from(n, (j) => 7 + 3 * Math.cos((Math.PI * l * (j + 0.5)) / n));
      const { share, frequency, multiplicity, complete, smoothness } = energyCurve(net, basis, signal, plain);
      share.forEach((one, step) => expect(one).toBeCloseTo(step < l ? 0 : 1, 12));
      expect(frequency[l]).toBeCloseTo(4 * Math.sin((Math.PI * l) / (2 * n)) ** 2, 12);
      expect(smoothness.value).toBeCloseTo(frequency[l]!, 12);
      expect([...multiplicity]).toEqual(Array<number>(n).fill(1));
      expect(complete).toBe(true);
    }
  });

  it('cycle: a wave of any phase is one jump, as double frequencies are one step', () => {
    const net = ring(12);
    const basis = all(net);
    for (const phase of [0, 0.3, 1.1]) {
      const signal = from(12, (j) => Math.sin((2 * Math.PI * 2 * j) / 12 + phase));
      const { share, multiplicity, smoothness } = energyCurve(net, basis, signal, plain);
      expect([...multiplicity]).toEqual([1, 2, 2, 2, 2, 2, 1]);
      share.forEach((one, step) => expect(one).toBeCloseTo(step < 2 ? 0 : 1, 12));
      expect(smoothness.value).toBeCloseTo(2 - 2 * Math.cos((2 * Math.PI * 2) / 12), 12);
    }
  });

  it('complete network: two steps, 0 and n, and nothing that a shuffle could change', () => {
    const net = complete(9);
    const curve = energyCurve(
      net,
      all(net),
      from(9, (j) => j ** 3),
      { permutations: 39, seed: 5 },
    );
    expect([...curve.multiplicity]).toEqual([1, 8]);
    expect(curve.frequency[1]).toBeCloseTo(9, 10);
    for (const line of [curve.share, curve.expectation, curve.band!.low, curve.band!.high]) {
      expect(line[0]).toBeCloseTo(0, 12);
      expect(line[1]).toBeCloseTo(1, 12);
    }
    expect(curve.smoothness.value).toBeCloseTo(9, 10);
    expect(curve.smoothness.expectation).toBeCloseTo(9, 10);
    expect(curve.smoothness.permutationP).toBe(1);
  });
});

describe('under shuffling', () => {
  it.each(['combinatorial', 'normalised', 'regularised'] as const)(
    'the expectation is the mean over all orders, to rounding (%s)',
    (laplacian) => {
      for (const net of [path(5), star(6)]) {
        const basis = all(net, laplacian);
        const values = [3, -1, 4, 1, 5.5, 9].slice(0, net.n);
        let count = 0;
        let mean = 0;
        const sum = new Float64Array(net.n);
        for (const order of orders(values)) {
          const { share, smoothness } = energyCurve(net, basis, Float64Array.from(order), plain);
          share.forEach((one, step) => (sum[step]! += one));
          mean += smoothness.value;
          count++;
        }
        const { expectation, smoothness } = energyCurve(net, basis, Float64Array.from(values), plain);
        expectation.forEach((one, step) => expect(sum[step]! / count).toBeCloseTo(one, 12));
        expect(mean / count).toBeCloseTo(smoothness.expectation, 12);
      }
    },
  );

  it('every frequency but 0 is expected to hold 1/(n − 1) of the energy', () => {
    const net = path(20);
    const { expectation } = energyCurve(
      net,
      all(net),
      from(20, (j) => j * j),
      plain,
    );
    expectation.forEach((one, step) => expect(one).toBeCloseTo(step / 19, 12));
  });

  it('the band holds the expectation, in order, and a signal without pattern in 95 % of its places', () => {
    const { network } = planted(150, 3, 8, 0.2, 2);
    const basis = all(network);
    const random = createRandom(11);
    let inside = 0;
    let places = 0;
    const ps: number[] = [];
    for (let round = 0; round < 40; round++) {
      const curve = energyCurve(
        network,
        basis,
        from(150, () => random.normal()),
        { permutations: 199, seed: round },
      );
      const { low, middle, high } = curve.band!;
      curve.share.forEach((one, step) => {
        expect(low[step]).toBeLessThanOrEqual(middle[step]!);
        expect(middle[step]).toBeLessThanOrEqual(high[step]!);
        if (step === 0 || step === curve.share.length - 1) return;
        places++;
        if (one >= low[step]! && one <= high[step]!) inside++;
      });
      ps.push(curve.smoothness.permutationP);
    }
    expect(inside / places).toBeGreaterThan(0.9);
    expect(ps.filter((p) => p <= 0.1).length).toBeLessThan(10);
    expect(Math.min(...ps)).toBeGreaterThanOrEqual(1 / 200);
  });

  it('a level per group stands above the band at once, at the smallest p there can be', () => {
    const { network, labels } = planted(150, 3, 8, 0.1, 2);
    const random = createRandom(3);
    const signal = from(150, (i) => 2 * labels[i]! + random.normal());
    const { share, band, smoothness } = energyCurve(network, all(network), signal, {
      permutations: 199,
      seed: 1,
    });
    expect(share[4]).toBeGreaterThan(band!.high[4]!);
    expect(smoothness.value).toBeLessThan(smoothness.expectation);
    expect(smoothness.permutationP).toBe(1 / 200);
  });
});

it('the first k pairs give the beginning of the whole curve, the same summary, and the same bytes for a seed', () => {
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 1_000 }), (seed) => {
      const { network } = planted(60, 2, 6, 0.3, seed);
      const random = createRandom(seed);
      const signal = from(60, () => random.normal());
      const options = { permutations: 19, seed };
      const whole = energyCurve(network, all(network), signal, options);
      const basis = spectrum(network, { laplacian: 'combinatorial', count: 9 });
      const some = energyCurve(network, basis, signal, options);
      const steps = some.share.length - 1;
      expect(some.complete).toBe(false);
      for (let step = 0; step < steps; step++) {
        expect(some.share[step]).toBeCloseTo(whole.share[step]!, 8);
        expect(some.band!.high[step]).toBeCloseTo(whole.band!.high[step]!, 8);
      }
      expect(some.smoothness).toEqual(whole.smoothness);
      expect(energyCurve(network, basis, signal, options)).toEqual(some);
      // Parseval: the whole of the energy is in the whole basis.
      expect(whole.share.at(-1)).toBeCloseTo(1, 10);
      const mean = whole.share.reduce(
        (sum, one, step) => sum + whole.frequency[step]! * (one - (whole.share[step - 1] ?? 0)),
        0,
      );
      expect(mean).toBeCloseTo(whole.smoothness.value, 8);
    }),
    { numRuns: 15 },
  );
});

it('refuses in words, and neither overflows nor vanishes', () => {
  const net = path(6);
  const basis = all(net);
  const run = (values: number[]) => energyCurve(net, basis, Float64Array.from(values), plain);
  expect(() => run([1, 1, 1, 1, 1, 1])).toThrow(/equal/);
  expect(() => run([1, NaN, 2, 3, 4, 5])).toThrow(UnanswerableError);
  expect(() => run([1, Infinity, 2, 3, 4, 5])).toThrow(UnanswerableError);
  expect(() => run([1, 2, 3])).toThrow(/same network/);
  const usual = run([1, 2, 3, 5, 4, 6]);
  for (const unit of [1e-300, 1e306]) {
    const { share } = run([1, 2, 3, 5, 4, 6].map((one) => one * unit));
    share.forEach((one, step) => expect(one).toBeCloseTo(usual.share[step]!, 10));
  }
});
