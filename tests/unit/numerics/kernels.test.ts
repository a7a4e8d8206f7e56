import { describe, expect, it } from 'vitest';
import { compileKernels } from '../../../src/run/kernels.mjs';
import {
  createRandom,
  laplacianOperator,
  localityOrder,
  matrixBytes,
  ShiftedSystems,
  subnetwork,
} from '@/numerics';
import { addCombination, dot, project, rotate } from '@/numerics/eigen/vectors';
import { Supply } from '@/numerics/eigen/supply';
import { KernelMemory } from '@/numerics/kernels';
import { SecondThread } from '@/numerics/kernels/second-thread';
import { compiledKernels } from '@/numerics/kernels/compiled';
import type { LaplacianKind, Network } from '@/numerics';
import { fromTies } from './networks';

/** Numbers of stored entries that keep one thread, and that start the second. */
const THREADS = [
  ['one thread', 0],
  ['two threads', 1e9],
] as const;
const KINDS: readonly LaplacianKind[] = ['combinatorial', 'normalised', 'regularised'];

function randomNetwork(members: number, ties: number, seed: number): Network {
  const random = createRandom(seed);
  const draw = () => Math.floor(random.next() * members);
  return fromTies(
    members,
    Array.from({ length: ties }, (): [number, number, number] => {
      const a = draw();
      return [a, (a + 1 + (draw() % (members - 1))) % members, 0.5 + random.next()];
    }),
  );
}

const net: Network = randomNetwork(1_203, 4_000, 7);
const n = net.n;

const vectorsOf = (count: number, make: () => Float64Array, seed = 3): Float64Array[] => {
  const random = createRandom(seed);
  return Array.from({ length: count }, () => {
    const x = make();
    for (let i = 0; i < x.length; i++) x[i] = random.next() - 0.5;
    return x;
  });
};
const plain = (length = n) => new Float64Array(length);
/** Largest difference, relative to the largest entry. */
const apart = (a: ArrayLike<number>, b: ArrayLike<number>): number => {
  let most = 0;
  let size = 0;
  for (let i = 0; i < a.length; i++) {
    most = Math.max(most, Math.abs(a[i]! - b[i]!));
    size = Math.max(size, Math.abs(a[i]!));
  }
  return most / size;
};

it('the compiled kernels are those of the source', async () => {
  expect(await compileKernels()).toBe(compiledKernels);
});

describe.each(THREADS)('compiled kernels equal the plain loops, %s', (_, entries) => {
  const memory = new KernelMemory(n, matrixBytes(net) * 4 + 60 * (n + 8) * 8 + 400_000, entries);
  const kept = () => memory.take(n);

  it.each(KINDS)('products of the %s Laplacian', (kind) => {
    const op = laplacianOperator(net, kind);
    const inside = op.within(memory);
    const [x, z, out] = vectorsOf(3, plain) as [Float64Array, Float64Array, Float64Array];
    const [kx, kz, ko] = vectorsOf(3, kept) as [Float64Array, Float64Array, Float64Array];
    op.combine(x, z, 1.3, -0.4, 0.7, out);
    inside.combine(kx, kz, 1.3, -0.4, 0.7, ko);
    expect(memory.holds(kx, kz, ko)).toBe(true);
    expect(apart(out, ko)).toBeLessThan(1e-14);
  });

  it.each(KINDS)('eight at once, %s', (kind) => {
    const op = laplacianOperator(net, kind);
    const eight = new KernelMemory(n, matrixBytes(net) + 18 * (n + 8) * 8, entries);
    const inside = op.within(eight);
    const [x] = vectorsOf(1, () => plain(8 * n)) as [Float64Array];
    const kx = eight.take(8 * n);
    kx.set(x);
    const own = Float64Array.from({ length: n }, (__, i) => i % 3);
    const keptOwn = eight.take(n);
    keptOwn.set(own);
    const [out, dots, keptDots] = [plain(8 * n), plain(8), plain(8)];
    const keptOut = eight.take(8 * n);
    expect(eight.holds(kx, keptOwn, keptOut)).toBe(true);
    op.shifted8(own, 2.5, x, out, dots);
    inside.shifted8(keptOwn, 2.5, kx, keptOut, keptDots);
    expect(apart(out, keptOut)).toBeLessThan(1e-14);
    expect(apart(dots, keptDots)).toBeLessThan(1e-13);
    eight.close();
  });

  it('sums, combinations and turns of a basis', () => {
    const basis = vectorsOf(11, plain);
    const inside = vectorsOf(11, kept);
    const [h, kh] = [new Float64Array(11), new Float64Array(11)];
    project(basis, 10, basis[10]!, h);
    project(inside, 10, inside[10]!, kh);
    expect(apart(h, kh)).toBeLessThan(1e-12);
    expect(Math.abs(dot(basis[0]!, basis[1]!) - dot(inside[0]!, inside[1]!))).toBeLessThan(1e-12);
    addCombination(basis, 10, h, -0.5, basis[10]!);
    addCombination(inside, 10, h, -0.5, inside[10]!);
    expect(apart(basis[10]!, inside[10]!)).toBeLessThan(1e-13);
    const [turn] = vectorsOf(1, () => plain(6 * 11), 9) as [Float64Array];
    rotate(basis, 11, 6, turn, new Supply(plain));
    rotate(inside, 11, 6, turn, new Supply(kept));
    for (let r = 0; r < 6; r++) expect(apart(basis[r]!, inside[r]!)).toBeLessThan(1e-13);
    memory.close();
  });
});

it('one and two threads give the same bytes', () => {
  const [one, two] = THREADS.map(([, entries]) => {
    const memory = new KernelMemory(n, matrixBytes(net) + 8 * (n + 8) * 8, entries);
    const op = laplacianOperator(net, 'regularised').within(memory);
    const [x, out] = vectorsOf(2, () => memory.take(n)) as [Float64Array, Float64Array];
    op.multiply(x, out);
    const answer = [...out, dot(x, out)];
    memory.close();
    return answer;
  });
  expect(two).toEqual(one);
});

it('a full memory hands out plain arrays, which take the plain path', () => {
  const memory = new KernelMemory(n, 1_000, 0);
  let outside = memory.take(n);
  for (let k = 0; k < 40 && memory.holds(outside); k++) outside = memory.take(n);
  expect(memory.holds(outside)).toBe(false);
  const op = laplacianOperator(net, 'normalised').within(memory);
  const [x, out] = vectorsOf(2, () => op.vector()) as [Float64Array, Float64Array];
  const expected = plain();
  laplacianOperator(net, 'normalised').multiply(x, expected);
  op.multiply(x, out);
  expect([...out]).toEqual([...expected]);
});

describe('ShiftedSystems', () => {
  const s = Float64Array.from({ length: n }, (_, i) => (i % 4 === 0 ? 0 : 1 + (i % 3)));

  it.each(KINDS)(
    'solves more right-hand sides than eight, a zero and a good start among them (%s)',
    (kind) => {
      const op = laplacianOperator(net, kind);
      const systems = new ShiftedSystems(op);
      const right = [...vectorsOf(10, plain), plain()];
      const solved = systems.solve(s, 3, right);
      const again = systems.solve(s, 3, right, { starts: solved.map(({ x }) => x) });
      systems.close();
      expect(solved).toHaveLength(11);
      solved.forEach(({ x, residual }, k) => {
        const out = plain();
        op.multiply(x, out);
        const left = out.map((one, i) => right[k]![i]! - s[i]! * x[i]! - 3 * one);
        const size = Math.sqrt(dot(right[k]!, right[k]!)) || 1;
        expect(Math.sqrt(dot(left, left)) / size).toBeLessThan(1.1e-10);
        expect(residual).toBeLessThanOrEqual(1e-10);
        expect(apart([...x, 1], [...again[k]!.x, 1])).toBeLessThan(1e-9);
      });
      expect([...solved[10]!.x].every((one) => one === 0)).toBe(true);
    },
  );

  it('says how far it came when it does not settle', () => {
    const systems = new ShiftedSystems(laplacianOperator(net, 'combinatorial'));
    expect(() => systems.solve(s, 1e6, vectorsOf(1, plain), { ceiling: 3 })).toThrow(
      /did not reach its accuracy/,
    );
    systems.close();
  });
});

describe('localityOrder', () => {
  it('is a permutation, the same every time, and brings ties together', () => {
    const order = localityOrder(net);
    expect([...order].sort((a, b) => a - b)).toEqual([...Array(n).keys()]);
    expect(localityOrder(net)).toEqual(order);
    const reach = (one: Network): number => {
      let sum = 0;
      for (let i = 0; i < one.n; i++)
        for (let p = one.offsets[i]!; p < one.offsets[i + 1]!; p++) sum += Math.abs(one.targets[p]! - i);
      return sum;
    };
    // Two communities whose members were dealt out in turn.
    const cards = subnetwork(
      pairOfCommunities(),
      Int32Array.from({ length: 400 }, (_, i) => (i % 2) * 200 + (i >> 1)),
    );
    expect(reach(subnetwork(cards, localityOrder(cards)))).toBeLessThan(0.7 * reach(cards));
  });

  it('answers for a network without members or ties', () => {
    expect(localityOrder(subnetwork(net, new Int32Array()))).toHaveLength(0);
    const lonely = subnetwork(net, Int32Array.of(0));
    expect([...localityOrder(lonely)]).toEqual([0]);
  });
});

function pairOfCommunities(): Network {
  const halves = [randomNetwork(200, 2_000, 1), randomNetwork(200, 2_000, 2)] as const;
  const offsets = new Int32Array(401);
  const targets = new Int32Array(halves[0].targets.length + halves[1].targets.length);
  const weights = new Float64Array(targets.length).fill(1);
  halves.forEach((half, h) => {
    const shift = h * halves[0].targets.length;
    half.targets.forEach((j, p) => (targets[shift + p] = j + 200 * h));
    for (let i = 0; i < 200; i++) offsets[200 * h + i + 1] = shift + half.offsets[i + 1]!;
  });
  return { n: 400, offsets, targets, weights, strength: new Float64Array(400).fill(1) };
}

it('says so when its second thread is gone, instead of waiting for ever', async () => {
  const memory = new WebAssembly.Memory({ initial: 2, maximum: 2, shared: true });
  const thread = SecondThread.start(memory, 200);
  await thread.end();
  thread.begin('project', []);
  expect(() => thread.wait()).toThrow('no longer answers');
});

it('works with what memory there is when more is asked for than 32 bits address', () => {
  const memory = new KernelMemory(n, 2 ** 40, 0);
  const x = memory.take(n).fill(2);
  expect(memory.holds(x)).toBe(true);
  expect(memory.dot(x, x)).toBe(4 * n);
});
