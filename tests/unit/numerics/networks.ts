import { buildNetwork, createRandom, type Network } from '@/numerics';

/** Networks with closed forms, and random ones, for the tests of the numerical core. */
export function fromTies(n: number, ties: readonly (readonly [number, number, number?])[]): Network {
  return buildNetwork(
    n,
    Int32Array.from(ties, (tie) => tie[0]),
    Int32Array.from(ties, (tie) => tie[1]),
    Float64Array.from(ties, (tie) => tie[2] ?? 1),
  );
}

const steps = (n: number): number[] => Array.from({ length: n }, (_, i) => i);

export const path = (n: number): Network =>
  fromTies(
    n,
    steps(n - 1).map((i) => [i, i + 1]),
  );
export const ring = (n: number): Network =>
  fromTies(
    n,
    steps(n).map((i) => [i, (i + 1) % n]),
  );
export const star = (n: number): Network =>
  fromTies(
    n,
    steps(n - 1).map((i) => [0, i + 1]),
  );
export const complete = (n: number): Network =>
  fromTies(
    n,
    steps(n).flatMap((i) => steps(i).map((j): [number, number] => [j, i])),
  );

export function grid(rows: number, columns: number): Network {
  const ties: [number, number][] = [];
  for (let r = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++) {
      const i = r * columns + c;
      if (c + 1 < columns) ties.push([i, i + 1]);
      if (r + 1 < rows) ties.push([i, i + columns]);
    }
  }
  return fromTies(rows * columns, ties);
}

export function hypercube(dimension: number): Network {
  const ties: [number, number][] = [];
  for (let i = 0; i < 2 ** dimension; i++) {
    for (let bit = 0; bit < dimension; bit++) if ((i & (1 << bit)) === 0) ties.push([i, i | (1 << bit)]);
  }
  return fromTies(2 ** dimension, ties);
}

/** Two complete networks of `half` members, joined by one tie. */
export function barbell(half: number): Network {
  const ties: [number, number][] = [[half - 1, half]];
  for (let i = 0; i < half; i++) for (let j = 0; j < i; j++) ties.push([j, i], [half + j, half + i]);
  return fromTies(2 * half, ties);
}

/** A planted block model: `degree` ties a member on average, a share `mixing` of them to any group. */
export function planted(n: number, groups: number, degree: number, mixing: number, seed: number) {
  const random = createRandom(seed);
  const labels = Int32Array.from({ length: n }, (_, i) => i % groups);
  const ties: [number, number][] = [];
  while (ties.length < (n * degree) / 2) {
    const i = random.int(n);
    const j =
      random.next() < mixing ? random.int(n) : random.int(Math.floor(n / groups)) * groups + labels[i]!;
    if (i !== j && j < n) ties.push([i, j]);
  }
  return { network: fromTies(n, ties), labels };
}
