/**
 * Closed forms: Brouwer & Haemers 2012, Spectra of Graphs, §1.4 (path, cycle, complete, star, products of them);
 * barbell: equitable partition. On the large networks the sparse solver runs, on the small ones the dense one.
 */
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  CancelledError,
  laplacianOperator,
  spectrum,
  subnetwork,
  type LaplacianKind,
  type Network,
  type Spectrum,
} from '@/numerics';
import { barbell, complete, fromTies, grid, hypercube, path, planted, ring, star } from './networks';

const kinds: LaplacianKind[] = ['combinatorial', 'normalised', 'regularised'];
const ascending = (values: number[]): number[] => values.sort((a, b) => a - b);

function expectValues(actual: ArrayLike<number>, expected: number[], bar: number): void {
  expect(actual.length).toBe(expected.length);
  expected.forEach((value, l) => expect(Math.abs(actual[l]! - value), `λ[${l}]`).toBeLessThanOrEqual(bar));
}

/** Residuals below the promise, unit length, pairwise orthogonal, finite. */
function expectSound(found: Spectrum, tolerance = 1e-8): void {
  for (const residual of found.residuals)
    expect(residual).toBeLessThanOrEqual(tolerance * found.norm + 1e-300);
  found.vectors.forEach((x, a) => {
    for (let b = 0; b <= a; b++) {
      const inner = x.reduce((sum, value, i) => sum + value * found.vectors[b]![i]!, 0);
      expect(Math.abs(inner - (a === b ? 1 : 0))).toBeLessThan(1e-9);
    }
  });
}

const cosine = (x: number): number => 2 - 2 * Math.cos(x);
const pathValues = (n: number): number[] => Array.from({ length: n }, (_, l) => cosine((Math.PI * l) / n));
const ringValues = (n: number): number[] =>
  ascending(Array.from({ length: n }, (_, l) => cosine((2 * Math.PI * l) / n)));
const gridValues = (a: number, b: number): number[] =>
  ascending(pathValues(a).flatMap((x) => pathValues(b).map((y) => x + y)));

describe('closed forms, all eigenvalues', () => {
  const cube = (d: number): number[] =>
    ascending(Array.from({ length: 2 ** d }, (_, i) => 2 * i.toString(2).replaceAll('0', '').length));
  it.each<[string, Network, LaplacianKind, number[]]>([
    ['path', path(40), 'combinatorial', pathValues(40)],
    ['path', path(40), 'normalised', Array.from({ length: 40 }, (_, l) => 1 - Math.cos((Math.PI * l) / 39))],
    ['cycle', ring(41), 'combinatorial', ringValues(41)],
    ['cycle', ring(41), 'normalised', ringValues(41).map((x) => x / 2)],
    ['complete', complete(12), 'combinatorial', [0, ...Array<number>(11).fill(12)]],
    ['complete', complete(12), 'normalised', [0, ...Array<number>(11).fill(12 / 11)]],
    ['star', star(30), 'combinatorial', [0, ...Array<number>(28).fill(1), 30]],
    ['star', star(30), 'normalised', [0, ...Array<number>(28).fill(1), 2]],
    ['grid', grid(7, 9), 'combinatorial', gridValues(7, 9)],
    ['hypercube', hypercube(6), 'combinatorial', cube(6)],
    ['hypercube', hypercube(6), 'normalised', cube(6).map((x) => x / 6)],
  ])('%s, %s', (_, net, laplacian, expected) => {
    const found = spectrum(net, { laplacian, count: 'all' });
    expectValues(found.values, expected, 1e-11);
    expect(found.complete).toBe(true);
    expectSound(found);
  });

  it('barbell of two complete networks of h members: λ₂ is the smaller root of x² − (h + 2) x + 2, from its quotient', () => {
    // Antisymmetric on the quotient {inner members, bridge end}: [[1, −1], [−(h − 1), h + 1]].
    const h = 9;
    const trace = h + 2;
    const determinant = h + 1 - (h - 1);
    const expected = (trace - Math.sqrt(trace * trace - 4 * determinant)) / 2;
    expect(spectrum(barbell(h), { laplacian: 'combinatorial', count: 2 }).values[1]).toBeCloseTo(
      expected,
      12,
    );
  });
});

describe('closed forms, large networks', () => {
  it('a ring of 100,000: every double eigenvalue twice, with eight digits', () => {
    const found = spectrum(ring(100_000), { laplacian: 'combinatorial', count: 7 });
    for (let l = 1; l < 7; l++) {
      const exact = 4 * Math.sin((Math.PI * Math.ceil(l / 2)) / 100_000) ** 2;
      expect(Math.abs(found.values[l]! / exact - 1)).toBeLessThan(1e-8);
    }
    expect(Array.from(found.repeated)).toEqual([0, 1, 1, 1, 1, 1, 1]);
    expectSound(found);
  });

  it('a ring of 20,000, regularised with τ = 2: 1 − 2 cos θ / (2 + τ)', () => {
    const found = spectrum(ring(20_000), { laplacian: 'regularised', count: 5 });
    for (let l = 1; l < 5; l++) {
      const exact = 0.5 + Math.sin((Math.PI * Math.ceil(l / 2)) / 20_000) ** 2;
      expect(Math.abs(found.values[l]! - exact)).toBeLessThan(1e-14);
    }
    expectSound(found);
  });

  it('a path of 3,000, normalised', () => {
    const found = spectrum(path(3000), { laplacian: 'normalised', count: 5 });
    for (let l = 1; l < 5; l++)
      expect(found.values[l]! / (2 * Math.sin((Math.PI * l) / 2999 / 2) ** 2)).toBeCloseTo(1, 8);
    expectSound(found);
  });

  it('a square grid of 1,600, where values are repeated', () => {
    const found = spectrum(grid(40, 40), { laplacian: 'combinatorial', count: 12 });
    expectValues(found.values, gridValues(40, 40).slice(0, 12), 1e-8);
    expectSound(found);
  });

  it('a star of 100,000: eigenvalue 1 as often as asked', () => {
    const found = spectrum(star(100_000), { laplacian: 'combinatorial', count: 6 });
    expectValues(found.values, [0, 1, 1, 1, 1, 1], 1e-6);
    expect(found.norm).toBeCloseTo(100_000, 0);
    expectSound(found);
  });

  it('a hypercube of 1,024: tenfold λ₂', () => {
    const found = spectrum(hypercube(10), { laplacian: 'combinatorial', count: 12 });
    expectValues(found.values, [0, ...Array<number>(10).fill(2), 4], 1e-7);
    expectSound(found);
  });

  it.each(kinds)('the sparse and the dense solver agree on a block model (%s)', (laplacian) => {
    const { network } = planted(700, 4, 10, 0.2, 3);
    const dense = spectrum(network, { laplacian, count: 'all' });
    const sparse = spectrum(network, { laplacian, count: 10 });
    expectValues(sparse.values, Array.from(dense.values.slice(0, 10)), 1e-9 * dense.norm);
    expectSound(sparse);
  });
});

describe('difficult networks', () => {
  it('as many zeros as components, 10,000 of them', () => {
    const ties = Array.from({ length: 10_000 }, (_, c): [number, number] => [2 * c, 2 * c + 1]);
    const found = spectrum(fromTies(20_000, ties), { laplacian: 'normalised', count: 40 });
    expect(found.values.every((value) => value === 0)).toBe(true);
    expect(found.vectors.every((x) => x.every(Number.isFinite))).toBe(true);
  });

  it('values of the components are merged in order', () => {
    const net = fromTies(9, [
      [0, 1],
      [2, 3],
      [3, 4],
      [5, 6],
      [6, 7],
      [7, 8],
    ]);
    const found = spectrum(net, { laplacian: 'combinatorial', count: 'all' });
    const expected = [...pathValues(2), ...pathValues(3), ...pathValues(4)];
    expectValues(found.values, ascending(expected), 1e-12);
    expectSound(found);
  });

  it('one member, and members without ties', () => {
    expect(Array.from(spectrum(fromTies(1, []), { laplacian: 'combinatorial', count: 5 }).values)).toEqual([
      0,
    ]);
    expect(Array.from(spectrum(fromTies(3, []), { laplacian: 'normalised', count: 'all' }).values)).toEqual([
      0, 0, 0,
    ]);
    expect(() => spectrum(fromTies(3, []), { laplacian: 'regularised', count: 2 })).toThrow(/τ/);
    expect(() => spectrum(fromTies(0, []), { laplacian: 'normalised', count: 2 })).toThrow(/members/);
  });

  it.each(kinds)('weights over twelve orders of magnitude (%s)', (laplacian) => {
    const ties = Array.from({ length: 5000 }, (_, i): [number, number, number] => [
      i % 600,
      (i * 7 + 1) % 601,
      10 ** (((i * 31) % 13) - 6),
    ]);
    const found = spectrum(
      fromTies(
        601,
        ties.filter(([a, b]) => a !== b),
      ),
      { laplacian, count: 4 },
    );
    expect(found.vectors.every((x) => x.every(Number.isFinite))).toBe(true);
    expectSound(found);
  });

  it('stops on request and tells its progress', () => {
    const { network } = planted(2000, 2, 8, 0.2, 1);
    expect(() => spectrum(network, { laplacian: 'normalised', count: 4 }, { cancelled: () => true })).toThrow(
      CancelledError,
    );
    const seen: number[] = [];
    spectrum(network, { laplacian: 'normalised', count: 4 }, { progress: (done) => seen.push(done) });
    expect(seen.length).toBeGreaterThan(3);
    expect(seen.every((done, at) => done >= (seen[at - 1] ?? 0) && done <= 1)).toBe(true);
  });

  it('the same seed gives the same bytes', () => {
    const { network } = planted(1500, 3, 8, 0.2, 5);
    const solve = () => spectrum(network, { laplacian: 'regularised', count: 4, seed: 9 });
    expect(solve()).toEqual(solve());
  });
});

describe('operators', () => {
  it.each(kinds)(
    'one product, the product of 8 or 3 vectors and the dense matrix agree (%s)',
    (laplacian) => {
      const { network } = planted(80, 2, 6, 0.3, 8);
      const op = laplacianOperator(network, laplacian);
      const matrix = op.dense();
      for (const width of [3, 8]) {
        const block = Float64Array.from({ length: 80 * width }, (_, q) => Math.sin(q + 1));
        const out = new Float64Array(80 * width);
        op.multiplyBlock(block, width, out);
        for (let v = 0; v < width; v++) {
          const single = new Float64Array(80);
          op.multiply(
            single.map((_, i) => block[i * width + v]!),
            single,
          );
          for (let i = 0; i < 80; i++) {
            let exact = 0;
            for (let j = 0; j < 80; j++) exact += matrix[i * 80 + j]! * block[j * width + v]!;
            expect(Math.abs(single[i]! - exact)).toBeLessThan(1e-12 * op.norm);
            expect(Math.abs(out[i * width + v]! - exact)).toBeLessThan(1e-12 * op.norm);
          }
        }
      }
    },
  );
});

describe('properties', () => {
  const weighted = fc.array(
    fc
      .tuple(fc.nat(11), fc.nat(11), fc.double({ min: 0.1, max: 10, noNaN: true }))
      .filter(([a, b]) => a !== b),
    { minLength: 1, maxLength: 40 },
  );

  it('permuting members leaves the values; scaling ties scales L and leaves 𝓛', () => {
    fc.assert(
      fc.property(
        weighted,
        fc.shuffledSubarray([...Array(12).keys()], { minLength: 12 }),
        fc.double({ min: 0.01, max: 100, noNaN: true }),
        (list, order, c) => {
          const net = fromTies(12, list);
          const scaled = fromTies(
            12,
            list.map(([a, b, w]) => [a, b, c * w]),
          );
          for (const laplacian of kinds) {
            const plain = spectrum(net, { laplacian, count: 'all' });
            const bar = 1e-11 * Math.max(1, plain.norm);
            expectValues(
              spectrum(subnetwork(net, Int32Array.from(order)), { laplacian, count: 'all' }).values,
              Array.from(plain.values),
              bar,
            );
            const factor = laplacian === 'combinatorial' ? c : 1;
            expectValues(
              spectrum(scaled, { laplacian, count: 'all' }).values,
              Array.from(plain.values, (x) => factor * x),
              bar * Math.max(1, factor),
            );
          }
        },
      ),
      { numRuns: 40 },
    );
  });

  it('adding a component adds a zero; Parseval holds in the full basis', () => {
    fc.assert(
      fc.property(
        weighted,
        fc.array(fc.double({ min: -5, max: 5, noNaN: true }), { minLength: 14, maxLength: 14 }),
        (list, signal) => {
          const zeros = (net: Network): number =>
            spectrum(net, { laplacian: 'combinatorial', count: 'all' }).values.filter((x) => x === 0).length;
          const more = fromTies(14, [...list, [12, 13, 1]]);
          expect(zeros(more)).toBe(zeros(fromTies(12, list)) + 1);
          const { vectors } = spectrum(more, { laplacian: 'combinatorial', count: 'all' });
          const energy = vectors.reduce(
            (sum, u) => sum + u.reduce((inner, x, i) => inner + x * signal[i]!, 0) ** 2,
            0,
          );
          expect(energy).toBeCloseTo(
            signal.reduce((sum, x) => sum + x * x, 0),
            8,
          );
        },
      ),
      { numRuns: 40 },
    );
  });
});
